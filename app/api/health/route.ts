import { db } from "@/db/client";
import { pingDatabase } from "@/db/queries/health";

export const dynamic = "force-dynamic";

const ANSWER_WITHIN_MS = 2_000;

/** 200 when the server can do its work, 503 when it runs but has no database. `?check=live` asks for the first half only. */
export async function GET(request: Request): Promise<Response> {
  const asksLiveOnly = new URL(request.url).searchParams.get("check") === "live";
  const isReady = asksLiveOnly || (await answersInTime(pingDatabase(db)));
  return Response.json(
    { status: isReady ? "ok" : "no-database" },
    { status: isReady ? 200 : 503, headers: { "cache-control": "no-store" } },
  );
}

async function answersInTime(ping: Promise<void>): Promise<boolean> {
  let timer: NodeJS.Timeout | undefined;
  const timeout = new Promise<false>((resolve) => (timer = setTimeout(() => resolve(false), ANSWER_WITHIN_MS)));
  // why the database does not answer stands in its own log and in that of every real request: here yes or no is the answer
  const answered = ping.then(() => true, () => false);
  try {
    return await Promise.race([answered, timeout]);
  } finally {
    clearTimeout(timer);
  }
}
