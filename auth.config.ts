import type { NextAuthConfig } from "next-auth";

const SESSION_DAYS = 30;

/**
 * The part of the sign-in settings that needs no database; proxy.ts uses it to read the cookie. The cookie is an encrypted
 * JWT that holds a session token; whether that session still counts is decided by its row, in auth.ts.
 */
export const authConfig = {
  session: { strategy: "jwt", maxAge: SESSION_DAYS * 24 * 3600 },
  pages: { signIn: "/sign-in", error: "/sign-in" },
  providers: [],
} satisfies NextAuthConfig;
