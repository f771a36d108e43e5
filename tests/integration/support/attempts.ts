import { sql } from "drizzle-orm";
import type { RootDatabase, Scope, Transaction } from "@/db/client";
import { findWorkspaces } from "@/db/queries/people";
import { requireScenario } from "@/db/queries/scenarios";
import type { Deed } from "@/lib/access/table";
import { failure, success, type Result } from "@/lib/result";
import { answerSimulation } from "@/lib/server/simulation-route";
import { refusalOf } from "@/lib/server/deed";
import * as revisionDeeds from "@/lib/server/deeds/revisions";
import * as scenarioDeeds from "@/lib/server/deeds/scenarios";
import * as shareDeeds from "@/lib/server/deeds/shares";
import * as workspaceDeeds from "@/lib/server/deeds/workspace";
import { openShareLink } from "@/lib/server/share";
import { shortDocument } from "./world";

/** What a deed is tried on: a scenario, a link to it, and (for drafts) whose drafts were kept on it. */
export type Target = { scenarioId: string; linkId: string; linkToken: string; draftId: string; workspaceId: string };

type Attempt = (db: RootDatabase, scope: Scope | null, target: Target) => Promise<Result<unknown>>;

const reading = async (
  deed: Deed,
  scope: Scope | null,
  read: (scope: Scope) => Promise<unknown>,
): Promise<Result<unknown>> => {
  if (!scope) return failure("auth.required");
  try {
    return success(await read(scope));
  } catch (cause) {
    return refusalOf(cause, deed, scope.correlationId);
  }
};

/** Each deed through the function that the pages, actions and routes call. */
export const THROUGH_THE_SERVER: Record<Deed, Attempt> = {
  "workspace.read": async (db, scope, target) => {
    const workspaces = scope ? await findWorkspaces(db, { userId: scope.userId }) : [];
    return workspaces.some((one) => one.id === target.workspaceId) ? success(null) : failure("thing.missing");
  },
  "members.read": (db, scope) => workspaceDeeds.listMembers(db, scope, {}),
  "audit.read": (db, scope) => workspaceDeeds.listAudit(db, scope, {}),
  "scenario.read": (db, scope, target) =>
    reading("scenario.read", scope, (known) => requireScenario(db, known, target.scenarioId)),
  "scenario.create": (db, scope) => scenarioDeeds.createScenario(db, scope, { document: shortDocument() }),
  "scenario.duplicate": (db, scope, target) => scenarioDeeds.duplicateScenario(db, scope, target),
  "scenario.rename": (db, scope, target) =>
    scenarioDeeds.renameScenario(db, scope, { scenarioId: target.scenarioId, title: "Weir drive" }),
  "scenario.tag": (db, scope, target) =>
    scenarioDeeds.setTags(db, scope, { scenarioId: target.scenarioId, tags: ["weir"] }),
  "scenario.archive": (db, scope, target) => scenarioDeeds.archiveScenario(db, scope, target),
  "scenario.restore": (db, scope, target) => scenarioDeeds.restoreScenario(db, scope, target),
  "revision.read": (db, scope, target) => revisionDeeds.listRevisions(db, scope, target),
  "revision.save": (db, scope, target) =>
    revisionDeeds.saveRevision(db, scope, {
      scenarioId: target.scenarioId,
      baseRevisionNumber: 1,
      document: shortDocument("Weir drive", 25),
    }),
  "draft.read": async (db, scope, target) => {
    const drafts = await revisionDeeds.listKeptDrafts(db, scope, target);
    if (!drafts.ok) return drafts;
    return drafts.value.some((draft) => draft.id === target.draftId) ? success(null) : failure("thing.missing");
  },
  "share.list": (db, scope, target) => shareDeeds.listShareLinks(db, scope, target),
  "share.make": (db, scope, target) =>
    shareDeeds.createShareLink(db, scope, { scenarioId: target.scenarioId, label: "Works", follows: "newest" }),
  "share.change": (db, scope, target) => shareDeeds.changeExpiry(db, scope, { linkId: target.linkId, expiresAt: null }),
  "share.revoke": (db, scope, target) => shareDeeds.revokeShareLink(db, scope, target),
  "simulation.run": async (db, scope) => {
    const request = new Request("http://localhost/api/v1/simulations", {
      method: "POST",
      headers: { "content-type": "application/json" },
      body: JSON.stringify(shortDocument()),
    });
    const response = await answerSimulation(db, scope, request);
    return response.ok ? success(null) : failure(response.status === 401 ? "auth.required" : "access.denied");
  },
  "link.open": (db, _scope, target) => openShareLink(db, target.linkToken),
};

/** Tries a statement that returns rows: done if it returned one. */
const rows = async (tx: Transaction, statement: ReturnType<typeof sql>): Promise<boolean> =>
  (await tx.execute(statement)).length > 0;
const A_HASH = () => "a".repeat(40) + Math.random().toString(16).slice(2).padEnd(24, "0").slice(0, 24);

type RawAttempt = (tx: Transaction, scope: Scope, target: Target) => Promise<boolean>;

/**
 * The same deeds as bare SQL of the application's role, past every check in TypeScript: what row-level security and the
 * column rights alone let through. Null: the deed does not reach the database (`simulation.run`).
 */
export const THROUGH_BARE_SQL: Record<Deed, RawAttempt | null> = {
  "workspace.read": (tx, _scope, target) => rows(tx, sql`select id from workspaces where id = ${target.workspaceId}`),
  // the deed is the list of members, oneself aside
  "members.read": (tx, scope, target) =>
    rows(
      tx,
      sql`select user_id from memberships where workspace_id = ${target.workspaceId} and user_id <> ${scope.userId}`,
    ),
  "audit.read": (tx, _scope, target) => rows(tx, sql`select id from audit where workspace_id = ${target.workspaceId}`),
  "scenario.read": (tx, _scope, target) => rows(tx, sql`select id from scenarios where id = ${target.scenarioId}`),
  "scenario.create": (tx, scope, target) => rows(tx, insertScenario(scope, target, null)),
  "scenario.duplicate": (tx, scope, target) => rows(tx, insertScenario(scope, target, target.scenarioId)),
  "scenario.rename": (tx, _scope, target) =>
    rows(tx, sql`update scenarios set title = 'Weir drive' where id = ${target.scenarioId} returning id`),
  "scenario.tag": (tx, _scope, target) =>
    rows(tx, sql`update scenarios set tags = '{weir}' where id = ${target.scenarioId} returning id`),
  "scenario.archive": (tx, _scope, target) =>
    rows(tx, sql`update scenarios set archived_at = now() where id = ${target.scenarioId} returning id`),
  "scenario.restore": (tx, _scope, target) =>
    rows(tx, sql`update scenarios set archived_at = null where id = ${target.scenarioId} returning id`),
  "revision.read": (tx, _scope, target) =>
    rows(tx, sql`select id from revisions where scenario_id = ${target.scenarioId}`),
  "revision.save": (tx, scope, target) =>
    rows(
      tx,
      sql`
      insert into revisions (workspace_id, scenario_id, number, document, author_id, author_name)
      values (${target.workspaceId}, ${target.scenarioId}, 2, '{}', ${scope.userId}, 'x') returning id`,
    ),
  "draft.read": (tx, _scope, target) => rows(tx, sql`select id from kept_drafts where id = ${target.draftId}`),
  "share.list": (tx, _scope, target) =>
    rows(tx, sql`select id from share_links where scenario_id = ${target.scenarioId}`),
  "share.make": (tx, scope, target) =>
    rows(
      tx,
      sql`
      insert into share_links (workspace_id, scenario_id, token_hash, label, maker_id)
      values (${target.workspaceId}, ${target.scenarioId}, ${A_HASH()}, 'Works', ${scope.userId}) returning id`,
    ),
  "share.change": (tx, _scope, target) =>
    rows(
      tx,
      sql`update share_links set expires_at = now() + interval '1 day' where id = ${target.linkId} returning id`,
    ),
  "share.revoke": (tx, _scope, target) =>
    rows(tx, sql`update share_links set revoked_at = now() where id = ${target.linkId} returning id`),
  "simulation.run": null,
  "link.open": (tx, _scope, target) =>
    rows(
      tx,
      sql`select status from app.open_share_link(encode(sha256(convert_to(${target.linkToken}, 'UTF8')), 'hex')) where status = 'open'`,
    ),
};

const insertScenario = (scope: Scope, target: Target, from: string | null) => sql`
  insert into scenarios (workspace_id, owner_id, copied_from_id, title, newest_number)
  values (${target.workspaceId}, ${scope.userId}, ${from}, 'Copy', 1) returning id`;
