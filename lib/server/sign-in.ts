import { z } from "zod";
import { withScope, type RootDatabase } from "@/db/client";
import { createAuditRow } from "@/db/queries/audit";
import { createSession, getCredential } from "@/db/queries/people";
import { failure, success, type Result } from "@/lib/result";
import { findingsOf } from "./findings";
import { giveAttemptBack, takeAttempt } from "./limits";
import { dummyPasswordHash, verifyPassword, type VerifyPassword } from "./passwords";
import { createToken, hashToken } from "./tokens";

export const SESSION_DAYS = 30;

export const signInInput = z.object({
  email: z
    .string()
    .trim()
    .toLowerCase()
    .pipe(z.email({ error: "Enter an e-mail address such as name@example.org." }).max(254)),
  password: z.string().min(1, { error: "Enter your password." }).max(256),
});

export type Visit = { address: string; userAgent: string; correlationId: string };
export type SignedIn = { userId: string; userName: string; email: string; sessionToken: string };

/**
 * E-mail and password to a new session. An unknown e-mail and a wrong password take the same path: one look-up, exactly one
 * argon2 verification, one answer. Attempts count against the address and against the e-mail, whether or not it is known.
 */
export async function startSession(
  db: RootDatabase,
  input: unknown,
  visit: Visit,
  verify: VerifyPassword = verifyPassword,
): Promise<Result<SignedIn>> {
  const parsed = signInInput.safeParse(input);
  if (!parsed.success) return failure("input.invalid", { findings: findingsOf(parsed.error) });
  const { email, password } = parsed.data;
  const byAddress = await takeAttempt(db, "sign-in.address", visit.address);
  if (!byAddress.ok) return byAddress;
  const byEmail = await takeAttempt(db, "sign-in.email", email);
  if (!byEmail.ok) return byEmail;

  const credential = await getCredential(db, email);
  const isRight = await verify(credential?.passwordHash ?? (await dummyPasswordHash()), password);
  if (!credential || !isRight) return failure("auth.refused");

  const sessionToken = createToken();
  const { userId, userName } = credential;
  await withScope(db, { userId }, async (tx) => {
    await createSession(
      tx,
      { userId },
      {
        tokenHash: hashToken(sessionToken),
        userAgent: visit.userAgent.slice(0, 300),
        address: visit.address.slice(0, 64),
        lifeDays: SESSION_DAYS,
      },
    );
    await createAuditRow(
      tx,
      { userId, userName, correlationId: visit.correlationId },
      { deed: "session.start", detail: { address: visit.address } },
    );
  });
  await Promise.all([
    giveAttemptBack(db, "sign-in.address", visit.address),
    giveAttemptBack(db, "sign-in.email", email),
  ]);
  return success({ userId, userName, email, sessionToken });
}
