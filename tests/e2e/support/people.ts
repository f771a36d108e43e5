import { expect, type BrowserContext } from "@playwright/test";
import { DEMO_ACCOUNTS, DEMO_PASSWORD, type DemoEmail } from "@/lib/access/demo-accounts";

type Cookies = Awaited<ReturnType<BrowserContext["cookies"]>>;
// one sign-in per person and worker: signing in is deliberately slow, and limited in how often
const sessions = new Map<string, Cookies>();

const isHome = (account: (typeof DEMO_ACCOUNTS)[number]) => account.workspace === "home";

/** The first person of the demo's own team with this role. */
export function emailOf(role: (typeof DEMO_ACCOUNTS)[number]["role"]): DemoEmail {
  return DEMO_ACCOUNTS.find((account) => isHome(account) && account.role === role)!.email;
}

/**
 * Puts the session of a demo account into `context`, by the address that the form posts to, without the form (accounts.spec.ts
 * tries that). `isFresh` starts a session of its own, for tests that sign out or revoke.
 */
export async function signIn(context: BrowserContext, email: DemoEmail, { isFresh = false } = {}): Promise<void> {
  const known = isFresh ? undefined : sessions.get(email);
  if (known) return context.addCookies(known);
  const { csrfToken } = (await (await context.request.get("/api/auth/csrf")).json()) as { csrfToken: string };
  const answer = await context.request.post("/api/auth/callback/credentials", {
    form: { csrfToken, email, password: DEMO_PASSWORD },
    maxRedirects: 0,
  });
  expect(answer.headers().location ?? "").not.toContain("error");
  const cookies = await context.cookies();
  expect(cookies.some(({ name }) => name.endsWith("session-token"))).toBe(true);
  if (!isFresh) sessions.set(email, cookies);
}
