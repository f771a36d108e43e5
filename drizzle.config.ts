import { defineConfig } from "drizzle-kit";

// `npm run db:generate -- --name what_it_does` writes the next migration; it needs no database.
export default defineConfig({
  dialect: "postgresql",
  schema: "./db/schema/index.ts",
  out: "./drizzle",
});
