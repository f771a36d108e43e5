/** Runs once when the server starts, before the first request. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME !== "nodejs" || process.env.NEXT_PHASE === "phase-production-build") return;
  const [{ pinClientAddress }, { assertBoundByRowSecurity, db }] = await Promise.all([
    import("./lib/server/client-address"),
    import("./db/client"),
  ]);
  pinClientAddress();
  await assertBoundByRowSecurity(db);
}
