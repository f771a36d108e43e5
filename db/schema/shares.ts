import { sql } from "drizzle-orm";
import { check, foreignKey, index, integer, pgTable, text, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import { createdAt, key, moment } from "./columns";
import { users } from "./people";
import { revisions, scenarios } from "./scenarios";

/** A link that opens one scenario for whoever holds it. The token exists in the URL only; here is its SHA-256, which the app role may write but not read. */
export const shareLinks = pgTable(
  "share_links",
  {
    id: key(),
    workspaceId: uuid("workspace_id").notNull(),
    scenarioId: uuid("scenario_id").notNull(),
    tokenHash: text("token_hash").notNull(),
    label: text("label").notNull(),
    /** The pinned revision; null follows the newest. */
    revisionNumber: integer("revision_number"),
    makerId: uuid("maker_id")
      .notNull()
      .references(() => users.id, { onDelete: "restrict" }),
    createdAt: createdAt(),
    expiresAt: moment("expires_at"),
    revokedAt: moment("revoked_at"),
    openedCount: integer("opened_count").notNull().default(0),
    lastOpenedAt: moment("last_opened_at"),
  },
  (table) => [
    // serves app.open_share_link
    uniqueIndex("share_links_token_hash_unique").on(table.tokenHash),
    // serves the list of a scenario's links
    index("share_links_by_scenario").on(table.scenarioId, table.createdAt.desc()),
    foreignKey({
      name: "share_links_scenario_fk",
      columns: [table.scenarioId, table.workspaceId],
      foreignColumns: [scenarios.id, scenarios.workspaceId],
    }).onDelete("cascade"),
    foreignKey({
      name: "share_links_revision_fk",
      columns: [table.scenarioId, table.revisionNumber],
      foreignColumns: [revisions.scenarioId, revisions.number],
    }).onDelete("restrict"),
    check("share_links_label_has_length", sql`char_length(${table.label}) between 1 and 80`),
    check("share_links_hash_is_sha256", sql`${table.tokenHash} ~ '^[0-9a-f]{64}$'`),
  ],
);
