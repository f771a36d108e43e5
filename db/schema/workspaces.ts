import { index, pgEnum, pgTable, primaryKey, text, uuid } from "drizzle-orm/pg-core";
import { createdAt, key } from "./columns";
import { users } from "./people";

/** The five roles with a membership row; lib/access/table.ts says what each may (a test holds the two lists together). */
export const memberRole = pgEnum("member_role", ["admin", "lead", "designer", "trainer", "student"]);

/** A team and everything it owns. Never removed by the application. */
export const workspaces = pgTable("workspaces", {
  id: key(),
  name: text("name").notNull(),
  createdAt: createdAt(),
});

export const memberships = pgTable(
  "memberships",
  {
    workspaceId: uuid("workspace_id")
      .notNull()
      .references(() => workspaces.id, { onDelete: "cascade" }),
    userId: uuid("user_id")
      .notNull()
      .references(() => users.id, { onDelete: "cascade" }),
    /** The least role is the default: whoever comes in by a way that names none can do least. */
    role: memberRole("role").notNull().default("student"),
    createdAt: createdAt(),
  },
  (table) => [
    // the primary key serves app.role_in (workspace, user) inside every policy
    primaryKey({ columns: [table.workspaceId, table.userId] }),
    // serves "which workspaces am I in"
    index("memberships_by_user").on(table.userId),
  ],
);
