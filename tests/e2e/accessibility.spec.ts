import { expect, test } from "@playwright/test";
import { demoShareToken } from "@/db/demo/keys";
import { expectAccessible, themes, useTheme } from "./support/axe";
import { emailOf, signIn } from "./support/people";

const SIZES = [
  { width: 1440, height: 900 },
  { width: 390, height: 844 },
] as const;

for (const size of SIZES) {
  for (const theme of themes) {
    test(`every screen is free of serious axe findings and of sideways scrolling at ${size.width} x ${size.height}, ${theme}`, async ({ page, context }) => {
      test.setTimeout(150_000);
      await page.setViewportSize(size);
      await useTheme(page, theme);
      const look = async (path: string) => {
        await page.goto(path);
        await expect(page.getByRole("heading", { level: 1 }).first()).toBeVisible();
        if (/^\/(s\/|scenarios\/|$)/.test(path)) await expect(page.getByRole("slider").first().or(page.locator("[data-figure]").first()).first()).toBeVisible({ timeout: 20_000 });
        await expectAccessible(page, `${path} ${theme}`);
        expect(await page.evaluate(() => document.scrollingElement!.scrollWidth), path).toBeLessThanOrEqual(size.width);
      };
      await look("/");
      await look("/sign-in");
      await look(`/s/${demoShareToken("newest")}`);
      await signIn(context, emailOf("admin"));
      await look("/scenarios");
      await look("/account");
      await look("/workspace");
      await page.goto("/scenarios");
      const scenarioPath = await page.locator("tbody a").first().getAttribute("href");
      await look(scenarioPath!);
    });
  }
}

test("wrong, expired and revoked links have pages of their own", async ({ page }) => {
  for (const [token, words] of [
    ["x".repeat(43), /leads nowhere/i],
    [demoShareToken("expired"), /expired/i],
    [demoShareToken("revoked"), /withdrawn/i],
  ] as const) {
    await page.goto(`/s/${token}`);
    await expect(page.getByRole("heading", { level: 1 })).toHaveText(words);
  }
});

test("a student reads what is approved, and is told why there is nothing to make", async ({ page, context }) => {
  await signIn(context, emailOf("student"));
  await page.goto("/scenarios");
  await expect(page.getByRole("button", { name: "New scenario" })).toHaveAttribute("aria-disabled", "true");
  await page.getByRole("link", { name: "Gate drive, recirculating high" }).click();
  await expect(page.locator("[data-figure]").first()).toBeVisible({ timeout: 20_000 });
  await expect(page.getByRole("button", { name: "Save revision" })).toHaveCount(0);
});
