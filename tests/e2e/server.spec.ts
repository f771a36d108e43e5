import { expect, test } from "@playwright/test";

test("says that it is ready, database included", async ({ request }) => {
  const answer = await request.get("/api/health");
  expect(answer.status()).toBe(200);
  expect(await answer.json()).toEqual({ status: "ok" });
});

test("every answer forbids framing, sniffing and telling other sites the address", async ({ request }) => {
  const headers = (await request.get("/api/health")).headers();
  expect(headers).toMatchObject({ "x-frame-options": "DENY", "x-content-type-options": "nosniff", "referrer-policy": "same-origin" });
  expect(headers).not.toHaveProperty("x-powered-by");
});

test("the policy of a page gives each request a nonce of its own and allows no script without it", async ({ request }) => {
  const policies = await Promise.all([1, 2].map(async () => (await request.get("/sign-in")).headers()["content-security-policy"] ?? ""));
  const nonces = policies.map((policy) => /script-src [^;]*'nonce-([^']+)'/.exec(policy)?.[1]);
  expect(nonces[0]).toBeTruthy();
  expect(nonces[0]).not.toBe(nonces[1]);
  for (const policy of policies) expect(policy).not.toMatch(/script-src [^;]*'unsafe-(inline|eval)'/);
});

test("what a worker loads carries a policy without eval", async ({ request }) => {
  const answer = await request.get("/_next/static/no-such-file.js");
  expect(answer.headers()["content-security-policy"]).toBe("default-src 'none'; script-src 'self'; connect-src 'self'");
});

test("a simulation is refused to whoever is not signed in, as a problem document", async ({ request }) => {
  const answer = await request.post("/api/v1/simulations", { data: {} });
  expect(answer.status()).toBe(401);
  expect(answer.headers()["content-type"]).toContain("application/problem+json");
});

test("a scenario is not shown to whoever is not signed in: sign-in comes first", async ({ page }) => {
  await page.goto("/scenarios");
  await expect(page).toHaveURL(/\/sign-in/);
});
