import { integer, pgTable, primaryKey, text } from "drizzle-orm/pg-core";
import { moment } from "./columns";

/** Attempts per key and window. Keys are hashes (no address or e-mail in clear); app.count_attempt is the only way in. */
export const rateLimits = pgTable(
  "rate_limits",
  {
    key: text("key").notNull(),
    windowStart: moment("window_start").notNull(),
    attemptCount: integer("attempt_count").notNull(),
    /** When the row no longer counts and may be swept. */
    staleAt: moment("stale_at").notNull(),
  },
  // serves the count of one key in its current and previous window
  (table) => [primaryKey({ columns: [table.key, table.windowStart] })],
);
