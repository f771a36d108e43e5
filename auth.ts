import NextAuth, { CredentialsSignin, type DefaultSession } from "next-auth";
import Credentials from "next-auth/providers/credentials";
import { authConfig } from "./auth.config";
import { db } from "./db/client";
import { endSession, getSessionHolder } from "./db/queries/people";
import type { ErrorCode } from "./lib/errors";
import { logFault } from "./lib/server/log";
import { addressOf, correlationIdOf } from "./lib/server/request";
import { startSession } from "./lib/server/sign-in";
import { hashToken } from "./lib/server/tokens";

declare module "next-auth" {
  interface Session extends DefaultSession {
    person?: { userId: string; userName: string; userEmail: string; sessionId: string };
  }
  interface User {
    sessionToken?: string;
  }
}

/** A refused sign-in, with the code that the form shows. Never says whether the e-mail is known. */
export class SignInRefused extends CredentialsSignin {
  constructor(
    public readonly errorCode: ErrorCode,
    public readonly detail?: unknown,
  ) {
    super();
    this.code = errorCode;
  }
}

export const { handlers, auth, signIn, signOut } = NextAuth({
  ...authConfig,
  providers: [
    Credentials({
      credentials: { email: { type: "email" }, password: { type: "password" } },
      async authorize(input, request) {
        const visit = {
          address: addressOf(request.headers),
          userAgent: request.headers.get("user-agent") ?? "",
          correlationId: correlationIdOf(request.headers),
        };
        const started = await startSession(db, { email: input.email, password: input.password }, visit);
        if (!started.ok) throw new SignInRefused(started.code, started.detail);
        const { userId, userName, email, sessionToken } = started.value;
        return { id: userId, name: userName, email, sessionToken };
      },
    }),
  ],
  callbacks: {
    // null ends the session: a revoked row takes effect on the very next request
    async jwt({ token, user }) {
      if (user?.sessionToken) return { sub: user.id, sessionToken: user.sessionToken };
      if (typeof token.sessionToken !== "string") return null;
      const holder = await getSessionHolder(db, hashToken(token.sessionToken));
      return holder ? { sub: holder.userId, sessionToken: token.sessionToken, person: holder } : null;
    },
    session({ session, token }) {
      // built anew: the session token stays in the cookie
      return { expires: session.expires, user: {}, person: token.person as typeof session.person } as typeof session;
    },
  },
  events: {
    async signOut(message) {
      const token = "token" in message ? message.token?.sessionToken : undefined;
      if (typeof token === "string") await endSession(db, hashToken(token));
    },
  },
  logger: {
    error(error) {
      // refused passwords are counted by the limits; they are no faults of the server
      if ("type" in error && error.type === "CredentialsSignin") return;
      logFault("sign-in", {}, error);
    },
  },
});
