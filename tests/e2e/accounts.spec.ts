import { expect, test } from "@playwright/test";
import { DEMO_ACCOUNTS, DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { TEMPLATES } from "@/lib/scenario/templates";
import { emailOf, signIn } from "./support/people";

for (const { email, name } of DEMO_ACCOUNTS) {
  test(`${name} (${email}) signs in with the published password and may simulate`, async ({ context }) => {
    await signIn(context, email);
    const session = await (await context.request.get("/api/auth/session")).json();
    expect(session.person.userName).toBe(name);
    const answer = await context.request.post("/api/v1/simulations", { data: { document: TEMPLATES[0]!.document, at: [0] } });
    expect(answer.status()).toBe(200);
    expect((await answer.json()).status).toBe("reached-end");
  });
}

test("a wrong password and an unknown e-mail are refused alike, and no session begins", async ({ context }) => {
  const { csrfToken } = await (await context.request.get("/api/auth/csrf")).json();
  const refusals = [];
  for (const form of [{ email: emailOf("student"), password: `${DEMO_PASSWORD}!` }, { email: "nobody@lowmeadow.example.org", password: DEMO_PASSWORD }]) {
    const answer = await context.request.post("/api/auth/callback/credentials", { form: { csrfToken, ...form }, maxRedirects: 0 });
    const refusal = new URL(answer.headers().location ?? "", "http://localhost").searchParams;
    refusals.push(`${answer.status()} ${refusal.get("error")} ${refusal.get("code")}`);
    expect(await (await context.request.get("/api/auth/session")).json()).toBeNull();
  }
  expect(refusals[0]).toContain("CredentialsSignin");
  expect(refusals[1]).toBe(refusals[0]);
});
