import { DrizzleQueryError } from "drizzle-orm/errors";
import type { z } from "zod";
import { withScope, type RootDatabase, type Scope, type Transaction } from "@/db/client";
import { createAuditRow } from "@/db/queries/audit";
import { can, type Deed, type Thing } from "@/lib/access/table";
import { Refusal } from "@/lib/errors";
import { failure, type Result } from "@/lib/result";
import { findingsOf } from "./findings";
import { takeAttempt, type LimitName } from "./limits";
import { logFault } from "./log";

type Context<In, Known extends Thing, Prepared> = {
  tx: Transaction;
  scope: Scope;
  input: In;
  thing: Known;
  prepared: Prepared;
};

/** What one deed is made of. `defineDeed` puts the steps in their order, so that none can be left out. */
export type DeedParts<Schema extends z.ZodType, Known extends Thing, Prepared, Out> = {
  deed: Deed;
  input: Schema;
  /** What it is done to; throws Refusal `thing.missing` for what the person cannot see. Without it: the workspace at large. */
  thing?: (tx: Transaction, scope: Scope, input: z.output<Schema>) => Promise<Known>;
  limit?: LimitName;
  /** Slow work (a run of the engine) that must not hold a transaction open; done after the person was found entitled. */
  prepare?: (context: { db: RootDatabase; scope: Scope; input: z.output<Schema> }) => Promise<Prepared>;
  run: (context: Context<z.output<Schema>, Known, Prepared>) => Promise<Result<Out>>;
  /** What the audit row names; left out for reading, which leaves no row. */
  audit?: (context: { input: z.output<Schema>; result: Result<Out> }) => {
    thingId?: string;
    detail?: Record<string, unknown>;
  };
};

/** A deed as tests and actions call it. A null scope is a person who is not signed in. */
export type DeedFunction<In, Out> = (db: RootDatabase, scope: Scope | null, input: In) => Promise<Result<Out>>;

/**
 * parse -> actor -> can -> transaction { thing, can, run, audit row } -> Result. A Refusal thrown inside rolls back and
 * becomes the Result; a Result that `run` returns is committed, refused or not (a conflict keeps the draft it answers with).
 */
export function defineDeed<Schema extends z.ZodType, Known extends Thing, Prepared, Out>(
  parts: DeedParts<Schema, Known, Prepared, Out>,
): DeedFunction<z.input<Schema>, Out> {
  return async (db, scope, input) => {
    const parsed = await parts.input.safeParseAsync(input);
    if (!scope) return failure("auth.required");
    if (!parsed.success) return failure("input.invalid", { findings: findingsOf(parsed.error) });
    const data = parsed.data;

    const authorise = async (tx: Transaction): Promise<Known> => {
      const thing = parts.thing ? await parts.thing(tx, scope, data) : ({ isOwn: false } as Known);
      if (!can(scope.role, parts.deed, thing)) throw new Refusal("access.denied");
      return thing;
    };
    try {
      if (parts.limit) {
        const attempt = await takeAttempt(db, parts.limit, scope.userId);
        if (!attempt.ok) return attempt;
      }
      if (parts.prepare) await withScope(db, scope, authorise);
      const prepared = parts.prepare ? await parts.prepare({ db, scope, input: data }) : (undefined as Prepared);
      return await withScope(db, scope, async (tx) => {
        const thing = await authorise(tx);
        const result = await parts.run({ tx, scope, input: data, thing, prepared });
        if (parts.audit) {
          const outcome = result.ok ? {} : { refused: result.code };
          const { thingId, detail } = parts.audit({ input: data, result });
          await createAuditRow(tx, scope, { deed: parts.deed, thingId, detail: { ...detail, ...outcome } });
        }
        return result;
      });
    } catch (cause) {
      return refusalOf(cause, parts.deed, scope.correlationId);
    }
  };
}

/** A thrown thing as a Result. What row-level security or a guard refused was past the table: logged, because the table should have said so first. */
export function refusalOf(cause: unknown, deed: string, correlationId: string): Result<never> {
  if (cause instanceof Refusal) return failure(cause.code, { findings: cause.findings, detail: cause.detail });
  logFault("deed failed", { deed, correlationId }, cause);
  return failure(sqlStateOf(cause) === INSUFFICIENT_PRIVILEGE ? "access.denied" : "server.failed", {
    detail: { correlationId },
  });
}

// PostgreSQL Appendix A, class 42
const INSUFFICIENT_PRIVILEGE = "42501";

function sqlStateOf(cause: unknown): string | undefined {
  const inner: unknown = cause instanceof DrizzleQueryError ? cause.cause : cause;
  return inner instanceof Error && "code" in inner && typeof inner.code === "string" ? inner.code : undefined;
}
