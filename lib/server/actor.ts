import { cache } from "react";
import { cookies, headers } from "next/headers";
import { notFound, redirect } from "next/navigation";
import { auth } from "@/auth";
import { db, type Scope } from "@/db/client";
import { findWorkspaces, type WorkspaceView } from "@/db/queries/people";
import { Refusal } from "@/lib/errors";
import { addressOf, correlationIdOf, PATH_HEADER } from "./request";
import type { Person } from "./sessions";

/** Which of a person's workspaces is open in this browser; checked against the memberships on every request. */
export const WORKSPACE_COOKIE = "slackwater.workspace";

/** The signed-in person, or null. Asked of the sessions table once per request. */
export const getPerson = cache(async (): Promise<Person | null> => {
  const session = await auth();
  if (!session?.person) return null;
  return { ...session.person, correlationId: correlationIdOf(await headers()) };
});

export const getWorkspaces = cache(async (): Promise<WorkspaceView[]> => {
  const person = await getPerson();
  return person ? findWorkspaces(db, { userId: person.userId }) : [];
});

/** Person, workspace and role of this request; null for someone who is not signed in or belongs to no workspace. */
export const getScope = cache(async (): Promise<Scope | null> => {
  const [person, workspaces, jar] = await Promise.all([getPerson(), getWorkspaces(), cookies()]);
  const chosen = jar.get(WORKSPACE_COOKIE)?.value;
  const workspace = workspaces.find((one) => one.id === chosen) ?? workspaces[0];
  if (!person || !workspace) return null;
  return {
    userId: person.userId,
    userName: person.userName,
    workspaceId: workspace.id,
    workspaceName: workspace.name,
    role: workspace.role,
    correlationId: person.correlationId,
  };
});

/** For pages: the scope, or on to /sign-in, which comes back here afterwards. */
export async function requireScope(): Promise<Scope> {
  const scope = await getScope();
  if (scope) return scope;
  const path = (await headers()).get(PATH_HEADER) ?? "/scenarios";
  redirect(`/sign-in?from=${encodeURIComponent(path)}`);
}

/** For pages: a query whose `thing.missing` is the page "not there". */
export async function orNotFound<T>(answer: Promise<T>): Promise<T> {
  try {
    return await answer;
  } catch (cause) {
    if (cause instanceof Refusal && cause.code === "thing.missing") notFound();
    throw cause;
  }
}

/** The visitor's network address, for limits. */
export const getAddress = async (): Promise<string> => addressOf(await headers());
