import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { beforeEach, describe, expect, it } from "vitest";
import { THEME_COOKIE, themeOf, themeScript } from "@/components/shell/theme";
import { ThemeSwitch } from "@/components/shell/theme-switch";

const shown = () => document.documentElement.dataset.theme;
const kept = () => document.cookie.split("; ").find((one) => one.startsWith(`${THEME_COOKIE}=`))?.split("=")[1];

beforeEach(() => {
  document.documentElement.dataset.theme = "light";
  document.cookie = `${THEME_COOKIE}=; path=/; max-age=0`;
});

describe("the theme", () => {
  it("switches and is kept in a cookie, so that the next page comes in it", async () => {
    render(<ThemeSwitch />);
    expect(kept()).toBeUndefined();
    await userEvent.click(screen.getByRole("button", { name: "Theme: light. Switch to dark" }));
    expect(shown()).toBe("dark");
    expect(themeOf(kept())).toBe("dark");
    await userEvent.click(screen.getByRole("button", { name: "Theme: dark. Switch to light" }));
    expect(shown()).toBe("light");
    expect(themeOf(kept())).toBe("light");
  });

  it("is taken from the system without a cookie, and from nothing else in it", () => {
    expect(themeOf(undefined)).toBe("system");
    expect(themeOf("<script>")).toBe("system");
    for (const [isDark, expected] of [[true, "dark"], [false, "light"]] as const) {
      const asked: string[] = [];
      // the script as the page runs it before its first paint
      const run = new Function("document", "matchMedia", themeScript) as (page: Document, matchMedia: (query: string) => { matches: boolean }) => void;
      run(document, (query) => (asked.push(query), { matches: isDark }));
      expect(asked).toEqual(["(prefers-color-scheme: dark)"]);
      expect(shown()).toBe(expected);
    }
  });
});
