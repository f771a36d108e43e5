import { sql } from "drizzle-orm";
import { check, index, pgTable, text, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import { createdAt, key, moment } from "./columns";

/** People, whichever workspaces they belong to. Rows are never removed while a revision or audit row names them. */
export const users = pgTable(
  "users",
  {
    id: key(),
    /** Lower case, as typed otherwise. */
    email: text("email").notNull(),
    name: text("name").notNull(),
    createdAt: createdAt(),
  },
  (table) => [
    // serves app.find_credential at sign-in
    uniqueIndex("users_email_unique").on(table.email),
    check("users_email_is_lower_case", sql`${table.email} = lower(${table.email})`),
  ],
);

/** Password hashes (argon2id, PHC text). The app role may not read this table: app.find_credential does. */
export const credentials = pgTable("credentials", {
  userId: uuid("user_id")
    .primaryKey()
    .references(() => users.id, { onDelete: "cascade" }),
  passwordHash: text("password_hash").notNull(),
  changedAt: moment("changed_at").notNull().defaultNow(),
});

/**
 * One row per signed-in browser. The cookie holds a random token; this row holds its SHA-256 only, and a session counts
 * only while its row says so, so revoking acts on the next request.
 */
export const sessions = pgTable(
  "sessions",
  {
    id: key(),
    userId: uuid("user_id")
      .notNull()
      .references(() => users.id, { onDelete: "cascade" }),
    tokenHash: text("token_hash").notNull(),
    userAgent: text("user_agent").notNull(),
    /** Network address at sign-in: the coarse place shown in the list of sessions. */
    address: text("address").notNull(),
    createdAt: createdAt(),
    lastSeenAt: moment("last_seen_at").notNull().defaultNow(),
    expiresAt: moment("expires_at").notNull(),
    revokedAt: moment("revoked_at"),
  },
  (table) => [
    // serves app.touch_session on every request
    uniqueIndex("sessions_token_hash_unique").on(table.tokenHash),
    // serves the list of a person's sessions, newest first
    index("sessions_by_user").on(table.userId, table.createdAt.desc()),
  ],
);
