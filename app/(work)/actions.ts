"use server";

import { cookies } from "next/headers";
import { signOut as endSignIn } from "@/auth";
import { db } from "@/db/client";
import { failure, success, type Result } from "@/lib/result";
import { getPerson, getWorkspaces, WORKSPACE_COOKIE } from "@/lib/server/actor";
import { isSecure } from "@/lib/server/env";
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
  const workspaces = await getWorkspaces();
  if (!workspaces.some((workspace) => workspace.id === input.workspaceId)) return failure("thing.missing");
  (await cookies()).set(WORKSPACE_COOKIE, input.workspaceId, {
    httpOnly: true,
    sameSite: "lax",
    secure: isSecure(),
    path: "/",
    maxAge: 365 * 24 * 3600,
  });
  return success(null);
}
