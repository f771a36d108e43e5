import { db } from "@/db/client";
import { getScope } from "@/lib/server/actor";
import { answerSimulation } from "@/lib/server/simulation-route";

/** Simulates a document: the same engine, and so the same numbers, as the page and the command line. */
export async function POST(request: Request): Promise<Response> {
  return answerSimulation(db, await getScope(), request);
}
