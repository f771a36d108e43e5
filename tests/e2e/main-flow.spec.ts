import { expect, test, type Page } from "@playwright/test";
import { emailOf, signIn } from "./support/people";

/** The main job as one story: make, tune, save, share, open as a guest, revoke. Console errors fail it. */

const figureOf = (page: Page, name: string) => page.locator(`[data-figure="${name}"]`).first();

/** Text of a figure once the run is up to date. */
async function settled(page: Page, name: string): Promise<string> {
  await expect(page.getByText("Up to date").first()).toBeVisible();
  return figureOf(page, name).innerText();
}

async function drag(page: Page, label: RegExp, byPx: number): Promise<void> {
  const slider = page.getByRole("slider", { name: label }).first();
  await slider.scrollIntoViewIfNeeded();
  const thumbX = await slider.evaluate((element) => {
    const box = element.getBoundingClientRect();
    const [now, min, max] = ["aria-valuenow", "aria-valuemin", "aria-valuemax"].map((name) => Number(element.getAttribute(name)));
    return box.left + (box.width * (now! - min!)) / (max! - min!);
  });
  const box = (await slider.boundingBox())!;
  const y = box.y + box.height / 2;
  await page.mouse.move(thumbX, y);
  await page.mouse.down();
  for (let step = 1; step <= 8; step++) await page.mouse.move(thumbX + (byPx * step) / 8, y);
  await page.mouse.up();
}

function watchConsole(page: Page): string[] {
  const errors: string[] = [];
  page.on("console", (message) => message.type() === "error" && errors.push(message.text()));
  page.on("pageerror", (error) => errors.push(error.message));
  return errors;
}

test("a designer makes a scenario, tunes it, saves it and shares it; a guest plays; the link is revoked", async ({ page, context, browser }) => {
  test.setTimeout(180_000);
  page.setDefaultTimeout(20_000);
  const errors = watchConsole(page);
  await signIn(context, emailOf("designer"));
  await page.goto("/scenarios");
  await page.getByRole("button", { name: "New scenario" }).click();
  const title = "Sluice gate three, trial";
  await page.getByRole("dialog").getByRole("textbox", { name: "Name" }).fill(title);
  await page.getByRole("button", { name: "Make the scenario" }).click();
  await page.waitForURL(/\/scenarios\/[0-9a-f-]{36}/);

  const before = await settled(page, "motorMeanA");
  await drag(page, /duty/i, 24);
  await expect(figureOf(page, "motorMeanA")).not.toHaveText(before);
  const afterDuty = await settled(page, "motorMeanA");
  const lossBefore = await settled(page, "shuntAW");
  await drag(page, /shunt (value|resistance)/i, 30);
  await expect(figureOf(page, "shuntAW")).not.toHaveText(lossBefore);
  const afterShunt = await settled(page, "shuntAW");
  expect(afterDuty).not.toBe(before);
  expect(afterShunt).not.toBe(lossBefore);

  await page.getByRole("button", { name: "Save revision" }).click();
  await page.getByLabel("What is it about?").fill("duty and shunt tuned");
  await page.getByRole("dialog").getByRole("button", { name: /^Save/ }).click();
  await expect(page.getByRole("dialog")).toBeHidden();
  await expect(page.getByText(/rev 2 · saved/)).toBeVisible();
  await page.reload();
  expect(await settled(page, "shuntAW")).toBe(afterShunt);
  await expect(page.getByText(/rev 2 · saved/)).toBeVisible();

  await page.getByRole("button", { name: "Share" }).click();
  const dialog = page.getByRole("dialog");
  await dialog.getByLabel("Label").fill("for the pump house");
  await dialog.getByRole("button", { name: /make/i }).click();
  const url = await dialog.getByLabel("Link", { exact: true }).inputValue();
  expect(url).toContain("/s/");

  const guests = await browser.newContext();
  const guest = await guests.newPage();
  const guestErrors = watchConsole(guest);
  await guest.goto(new URL(url).pathname);
  await expect(guest.getByText("nothing you change is kept").first()).toBeVisible();
  expect(await settled(guest, "shuntAW")).toBe(afterShunt);
  await drag(guest, /shunt (value|resistance)/i, -30);
  await expect(figureOf(guest, "shuntAW")).not.toHaveText(afterShunt);
  await expect(guest.getByRole("button", { name: "Save revision" })).toHaveCount(0);
  await guest.reload();
  expect(await settled(guest, "shuntAW")).toBe(afterShunt);

  const row = dialog.getByRole("listitem", { name: "for the pump house" });
  await row.getByRole("button", { name: "Revoke" }).click();
  await row.getByRole("button", { name: /revoke/i }).first().click();
  await expect(row.getByText(/revoked/i).first()).toBeVisible();
  await guest.goto(new URL(url).pathname);
  await expect(guest.getByRole("heading", { name: /withdrawn/i })).toBeVisible();
  await guests.close();
  expect(errors).toEqual([]);
  // the withdrawn link answers 410, which the browser also reports
  expect(guestErrors.filter((text) => !/410|404/.test(text))).toEqual([]);
});
