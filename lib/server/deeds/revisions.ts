import { z } from "zod";
import { requireScenarioThing } from "@/db/queries/scenario-access";
import {
  createKeptDraft,
  createRevision,
  findKeptDrafts,
  findRevisions,
  markDraftKept,
  requireKeptDraft,
  requireNewestRevision,
  type NewestRevision,
} from "@/db/queries/revisions";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { failure, success, type Result } from "@/lib/result";
import { defineDeed } from "../deed";
import { keyField, messageField, scenarioField } from "../findings";
import { summarise } from "../summary";

export type SavedRevision = { number: number; revisionId: string };
/** `detail` of `edit.conflict`: the newest revision, and the draft under which the other version is kept. */
export type ConflictDetail = { newest: NewestRevision; kept: { draftId: string; document: ScenarioDocument } };

const numberField = z.int().min(1);

/** Both came through the scenario schema, which gives every document the same order of fields. */
const isSame = (one: ScenarioDocument, other: ScenarioDocument): boolean =>
  JSON.stringify(one) === JSON.stringify(other);

/**
 * Saves on top of the revision the person started from. If someone saved a newer one meanwhile, nothing is overwritten:
 * the document is kept as a draft of its author, and both come back.
 */
export const saveRevision = defineDeed({
  deed: "revision.save",
  input: z.object({
    scenarioId: keyField,
    baseRevisionNumber: numberField,
    document: scenarioField,
    message: messageField,
  }),
  limit: "revision.save",
  thing: (tx, scope, input) => requireScenarioThing(tx, scope, input.scenarioId),
  prepare: ({ input }) => summarise(input.document),
  run: async ({ tx, scope, input, thing, prepared }): Promise<Result<SavedRevision>> => {
    if (thing.isArchived) return failure("edit.archived");
    const { scenarioId, baseRevisionNumber: baseNumber, document, message } = input;
    const saved = await createRevision(tx, scope, { scenarioId, baseNumber, document, message, summary: prepared });
    if (saved) return success({ number: saved.number, revisionId: saved.id });
    const newest = await requireNewestRevision(tx, scope, scenarioId);
    // the answer to a first try was lost on the way: what is being saved is there already
    const isThere =
      newest.authorId === scope.userId && newest.number === baseNumber + 1 && isSame(newest.document, document);
    if (isThere) return success({ number: newest.number, revisionId: newest.id });
    const draftId = await createKeptDraft(tx, scope, { scenarioId, baseNumber, document, message });
    const detail: ConflictDetail = { newest, kept: { draftId, document } };
    return failure("edit.conflict", { detail });
  },
  audit: ({ input, result }) => ({
    thingId: input.scenarioId,
    detail: result.ok ? { number: result.value.number } : { baseNumber: input.baseRevisionNumber },
  }),
});

/** Saves a kept draft on top of the newest revision its author has now seen; a still newer one is a conflict again (the draft stays). */
export const keepMineAsRevision = defineDeed({
  deed: "revision.save",
  input: z.object({ scenarioId: keyField, draftId: keyField, baseRevisionNumber: numberField, message: messageField }),
  limit: "revision.save",
  thing: (tx, scope, input) => requireScenarioThing(tx, scope, input.scenarioId),
  prepare: async ({ db, scope, input }) => {
    const draft = await requireKeptDraft(db, scope, input.draftId);
    return { draft, summary: await summarise(draft.document) };
  },
  run: async ({ tx, scope, input, thing, prepared: { draft, summary } }): Promise<Result<SavedRevision>> => {
    if (thing.isArchived) return failure("edit.archived");
    if (draft.scenarioId !== input.scenarioId) return failure("thing.missing");
    const saved = await createRevision(tx, scope, {
      scenarioId: input.scenarioId,
      baseNumber: input.baseRevisionNumber,
      document: draft.document,
      message: input.message || draft.message,
      summary,
    });
    if (!saved) {
      const detail: ConflictDetail = {
        newest: await requireNewestRevision(tx, scope, input.scenarioId),
        kept: { draftId: draft.id, document: draft.document },
      };
      return failure("edit.conflict", { detail });
    }
    await markDraftKept(tx, scope, draft.id, saved.number);
    return success({ number: saved.number, revisionId: saved.id });
  },
  audit: ({ input, result }) => ({
    thingId: input.scenarioId,
    detail: { draftId: input.draftId, number: result.ok ? result.value.number : undefined },
  }),
});

/** The revisions that the person sees, newest first. */
export const listRevisions = defineDeed({
  deed: "revision.read",
  input: z.object({ scenarioId: keyField }),
  thing: (tx, scope, input) => requireScenarioThing(tx, scope, input.scenarioId),
  run: async ({ tx, scope, input }) => success(await findRevisions(tx, scope, input.scenarioId)),
});

/** The person's own versions that came second and wait to be kept. */
export const listKeptDrafts = defineDeed({
  deed: "draft.read",
  input: z.object({ scenarioId: keyField }),
  // the query answers the person's own drafts only
  thing: async (tx, scope, input) => ({ ...(await requireScenarioThing(tx, scope, input.scenarioId)), isOwn: true }),
  run: async ({ tx, scope, input }) => success(await findKeptDrafts(tx, scope, input.scenarioId)),
});
