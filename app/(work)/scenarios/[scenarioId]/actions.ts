"use server";

import { revalidatePath } from "next/cache";
import { db } from "@/db/client";
import type { KeptDraft, RevisionRow } from "@/db/queries/revisions";
import type { ShareLinkView } from "@/db/queries/shares";
import type { Result } from "@/lib/result";
import { getScope } from "@/lib/server/actor";
import * as revisionDeeds from "@/lib/server/deeds/revisions";
import type { SavedRevision } from "@/lib/server/deeds/revisions";
import { renameScenario as rename, setTags as tag } from "@/lib/server/deeds/scenarios";
import * as shareDeeds from "@/lib/server/deeds/shares";

/** Saves on top of revision `baseRevisionNumber`; `edit.conflict` carries a ConflictDetail: the newest revision and the kept draft. */
export async function saveRevision(input: {
  scenarioId: string;
  baseRevisionNumber: number;
  document: unknown;
  message?: string;
}): Promise<Result<SavedRevision>> {
  const result = await revisionDeeds.saveRevision(db, await getScope(), input);
  if (result.ok) revalidatePath("/scenarios");
  return result;
}

/** Saves a kept draft on top of the newest revision that was shown. */
export async function keepMineAsRevision(input: {
  scenarioId: string;
  draftId: string;
  baseRevisionNumber: number;
  message?: string;
}): Promise<Result<SavedRevision>> {
  const result = await revisionDeeds.keepMineAsRevision(db, await getScope(), input);
  if (result.ok) revalidatePath("/scenarios");
  return result;
}

export async function listRevisions(input: { scenarioId: string }): Promise<Result<RevisionRow[]>> {
  return revisionDeeds.listRevisions(db, await getScope(), input);
}

export async function listKeptDrafts(input: { scenarioId: string }): Promise<Result<KeptDraft[]>> {
  return revisionDeeds.listKeptDrafts(db, await getScope(), input);
}

export async function renameScenario(input: { scenarioId: string; title: string }): Promise<Result<{ title: string }>> {
  const result = await rename(db, await getScope(), input);
  if (result.ok) revalidatePath("/scenarios");
  return result;
}

export async function setTags(input: { scenarioId: string; tags: string[] }): Promise<Result<{ tags: string[] }>> {
  const result = await tag(db, await getScope(), input);
  if (result.ok) revalidatePath("/scenarios");
  return result;
}

/** Makes a link; its URL is in this answer only. */
export async function createShareLink(input: {
  scenarioId: string;
  label: string;
  follows: "pinned" | "newest";
  revisionNumber?: number;
  expiresAt?: Date | string | null;
}): Promise<Result<{ id: string; url: string }>> {
  return shareDeeds.createShareLink(db, await getScope(), input);
}

export async function listShareLinks(input: { scenarioId: string }): Promise<Result<ShareLinkView[]>> {
  return shareDeeds.listShareLinks(db, await getScope(), input);
}

export async function revokeShareLink(input: { linkId: string }): Promise<Result<null>> {
  return shareDeeds.revokeShareLink(db, await getScope(), input);
}

export async function changeExpiry(input: {
  linkId: string;
  expiresAt: Date | string | null;
}): Promise<Result<{ expiresAt: Date | null }>> {
  return shareDeeds.changeExpiry(db, await getScope(), input);
}
