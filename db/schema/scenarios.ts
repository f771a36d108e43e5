import { sql } from "drizzle-orm";
import { check, foreignKey, index, integer, jsonb, pgEnum, pgTable, text, unique, uuid } from "drizzle-orm/pg-core";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { createdAt, key, moment } from "./columns";
import { users } from "./people";
import { workspaces } from "./workspaces";

export const scenarioState = pgEnum("scenario_state", ["draft", "inReview", "approved", "superseded"]);

/** Figures of one revision for the scenario table; `null` in a revision means "not run". Column k of the spark spans [from + k h, from + (k+1) h). */
export type RunSummary = {
  motorRmsA: number;
  motorRippleA: number;
  headroomV: number | null;
  clippedShare: number;
  reconstructionErrorMaxA: number | null;
  /** A sample farther off than this misses the current. Revisions saved before it was kept have none. */
  errorLimitA?: number;
  spark: { fromS: number; toS: number; minA: number[]; maxA: number[] };
  /** The largest magnitude in the spark: the scale it is drawn to. */
  scaleA: number;
};

/** What a person opens and saves. The content is in its revisions; this row holds the name, the state and which revision is newest. */
export const scenarios = pgTable(
  "scenarios",
  {
    id: key(),
    workspaceId: uuid("workspace_id")
      .notNull()
      .references(() => workspaces.id, { onDelete: "restrict" }),
    ownerId: uuid("owner_id")
      .notNull()
      .references(() => users.id, { onDelete: "restrict" }),
    /** The scenario this one was copied from; for a student the only way to have one. */
    copiedFromId: uuid("copied_from_id"),
    title: text("title").notNull(),
    tags: text("tags")
      .array()
      .notNull()
      .default(sql`'{}'`),
    /** State of the newest revision. */
    state: scenarioState("state").notNull().default("draft"),
    newestNumber: integer("newest_number").notNull(),
    /** The newest approved revision: all that a student sees of a scenario of someone else. */
    approvedNumber: integer("approved_number"),
    archivedAt: moment("archived_at"),
    createdAt: createdAt(),
    changedAt: moment("changed_at").notNull().defaultNow(),
  },
  (table) => [
    // target of the two-column keys below: a revision or link cannot sit in another workspace than its scenario
    unique("scenarios_id_workspace_unique").on(table.id, table.workspaceId),
    foreignKey({
      name: "scenarios_copied_from_fk",
      columns: [table.copiedFromId],
      foreignColumns: [table.id],
    }).onDelete("set null"),
    // serves the scenario table: one workspace, newest change first
    index("scenarios_by_workspace_changed").on(table.workspaceId, table.changedAt.desc()),
    // serves the owner filter
    index("scenarios_by_workspace_owner").on(table.workspaceId, table.ownerId),
    // serves the tag filter (tags @> array[...])
    index("scenarios_by_tag").using("gin", table.tags),
    check("scenarios_title_has_length", sql`char_length(${table.title}) between 1 and 120`),
    check("scenarios_newest_is_counted", sql`${table.newestNumber} >= 1`),
  ],
);

/** Immutable: no UPDATE or DELETE right for the app role, and a trigger that refuses both to everyone. */
export const revisions = pgTable(
  "revisions",
  {
    id: key(),
    workspaceId: uuid("workspace_id").notNull(),
    scenarioId: uuid("scenario_id").notNull(),
    number: integer("number").notNull(),
    document: jsonb("document").$type<ScenarioDocument>().notNull(),
    authorId: uuid("author_id")
      .notNull()
      .references(() => users.id, { onDelete: "restrict" }),
    /** The author's name when saving: stays readable after the person has left. */
    authorName: text("author_name").notNull(),
    message: text("message").notNull().default(""),
    summary: jsonb("summary").$type<RunSummary>(),
    createdAt: createdAt(),
  },
  (table) => [
    // serves "revision n of this scenario" and refuses a second n
    unique("revisions_scenario_number_unique").on(table.scenarioId, table.number),
    foreignKey({
      name: "revisions_scenario_fk",
      columns: [table.scenarioId, table.workspaceId],
      foreignColumns: [scenarios.id, scenarios.workspaceId],
    }).onDelete("restrict"),
    check("revisions_number_is_counted", sql`${table.number} >= 1`),
  ],
);

/** The version that came second when two people saved at once: kept for its author, who may save it on top or let it be. */
export const keptDrafts = pgTable(
  "kept_drafts",
  {
    id: key(),
    workspaceId: uuid("workspace_id").notNull(),
    scenarioId: uuid("scenario_id").notNull(),
    authorId: uuid("author_id")
      .notNull()
      .references(() => users.id, { onDelete: "cascade" }),
    /** The revision the author had started from. */
    baseNumber: integer("base_number").notNull(),
    document: jsonb("document").$type<ScenarioDocument>().notNull(),
    message: text("message").notNull().default(""),
    /** The revision it became, once its author kept it. */
    keptAsNumber: integer("kept_as_number"),
    createdAt: createdAt(),
  },
  (table) => [
    foreignKey({
      name: "kept_drafts_scenario_fk",
      columns: [table.scenarioId, table.workspaceId],
      foreignColumns: [scenarios.id, scenarios.workspaceId],
    }).onDelete("cascade"),
    // serves "my kept drafts of this scenario"
    index("kept_drafts_by_scenario_author").on(table.scenarioId, table.authorId, table.createdAt.desc()),
  ],
);
