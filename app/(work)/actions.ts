"use server";

import { cookies } from "next/headers";
import { z } from "zod";
import { signOut as endSignIn } from "@/auth";
import { db } from "@/db/client";
import { failure, success, type Result } from "@/lib/result";
import { getPerson, getWorkspaces, WORKSPACE_COOKIE } from "@/lib/server/actor";
import { isSecure } from "@/lib/server/env";
import { findingsOf, keyField } from "@/lib/server/findings";
import { listOwnSessions, revokeOwnSession, type OwnSession } from "@/lib/server/sessions";

/** Ends the session of this browser, row and cookie. */
export async function signOut(): Promise<Result<null>> {
  await endSignIn({ redirect: false });
  return success(null);
}

export async function listSessions(): Promise<Result<OwnSession[]>> {
  return listOwnSessions(db, await getPerson());
}

export async function revokeSession(input: { sessionId: string }): Promise<Result<null>> {
  return revokeOwnSession(db, await getPerson(), input);
}

/** Opens another of the person's workspaces in this browser. */
export async function chooseWorkspace(input: { workspaceId: string }): Promise<Result<null>> {
  const parsed = z.object({ workspaceId: keyField }).safeParse(input);
  if (!parsed.success) return failure("input.invalid", { findings: findingsOf(parsed.error) });
  const { workspaceId } = parsed.data;
  const workspaces = await getWorkspaces();
  if (!workspaces.some((workspace) => workspace.id === workspaceId)) return failure("thing.missing");
  const life = { path: "/", maxAge: 365 * 24 * 3600 };
  (await cookies()).set(WORKSPACE_COOKIE, workspaceId, {
    httpOnly: true,
    sameSite: "lax",
    secure: isSecure(),
    ...life,
  });
  return success(null);
}
