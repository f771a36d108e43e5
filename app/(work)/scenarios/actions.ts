"use server";

import { revalidatePath } from "next/cache";
import { db } from "@/db/client";
import type { Result } from "@/lib/result";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { getScope } from "@/lib/server/actor";
import * as deeds from "@/lib/server/deeds/scenarios";

/** Makes a scenario from a template, or from a document that was imported. */
export async function createScenario(input: {
  templateId?: string;
  document?: unknown;
  title?: string;
}): Promise<Result<{ id: string }>> {
  return refreshed(await deeds.createScenario(db, await getScope(), input));
}

export async function duplicateScenario(input: {
  scenarioId: string;
  title?: string;
}): Promise<Result<{ id: string }>> {
  return refreshed(await deeds.duplicateScenario(db, await getScope(), input));
}

/** The document of the revision that the person sees, to be exported. */
export async function readDocument(input: { scenarioId: string }): Promise<Result<ScenarioDocument>> {
  return deeds.readDocument(db, await getScope(), input);
}

export async function archiveScenario(input: { scenarioId: string }): Promise<Result<null>> {
  return refreshed(await deeds.archiveScenario(db, await getScope(), input));
}

export async function restoreScenario(input: { scenarioId: string }): Promise<Result<null>> {
  return refreshed(await deeds.restoreScenario(db, await getScope(), input));
}

function refreshed<T>(result: Result<T>): Result<T> {
  if (result.ok) revalidatePath("/scenarios");
  return result;
}
