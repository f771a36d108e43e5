import { timestamp, uuid } from "drizzle-orm/pg-core";

/** Shared columns: every family dates and keys its rows alike. */
export const key = () => uuid("id").primaryKey().defaultRandom();
export const moment = (name: string) => timestamp(name, { withTimezone: true, mode: "date" });
export const createdAt = () => moment("created_at").notNull().defaultNow();
