"use server";

import { AuthError } from "next-auth";
import { signIn as startSignIn, SignInRefused } from "@/auth";
import { safeReturnPath } from "@/lib/access/return-path";
import { failure, success, type Result } from "@/lib/result";
import { findingsOf } from "@/lib/server/findings";
import { signInInput } from "@/lib/server/sign-in";

/** Signs in with e-mail and password and sets the cookie; answers where to go next. `from` is the page that sent the person here. */
export async function signIn(input: {
  email: string;
  password: string;
  from?: string;
}): Promise<Result<{ returnPath: string }>> {
  const parsed = signInInput.safeParse(input);
  if (!parsed.success) return failure("input.invalid", { findings: findingsOf(parsed.error) });
  try {
    await startSignIn("credentials", { ...parsed.data, redirect: false });
  } catch (cause) {
    if (cause instanceof SignInRefused) return failure(cause.errorCode, { detail: cause.detail });
    if (cause instanceof AuthError) return failure("auth.refused");
    throw cause;
  }
  return success({ returnPath: safeReturnPath(input.from) });
}
