import { bigint, index, jsonb, pgTable, text, uuid } from "drizzle-orm/pg-core";
import { createdAt } from "./columns";
import { users } from "./people";
import { workspaces } from "./workspaces";

/** Who did what to which thing, one row per action, written in the action's own transaction. Append-only by rights and by trigger. */
export const audit = pgTable(
  "audit",
  {
    id: bigint("id", { mode: "number" }).primaryKey().generatedAlwaysAsIdentity(),
    /** Null for what belongs to a person and no workspace: signing in, ending a session. */
    workspaceId: uuid("workspace_id").references(() => workspaces.id, { onDelete: "restrict" }),
    actorId: uuid("actor_id")
      .notNull()
      .references(() => users.id, { onDelete: "restrict" }),
    actorName: text("actor_name").notNull(),
    deed: text("deed").notNull(),
    thingId: text("thing_id"),
    detail: jsonb("detail").$type<Record<string, unknown>>().notNull().default({}),
    /** The request it came from: the same id stands in the log. */
    correlationId: text("correlation_id").notNull(),
    createdAt: createdAt(),
  },
  // serves the audit list of a workspace, newest first
  (table) => [index("audit_by_workspace").on(table.workspaceId, table.createdAt.desc())],
);
