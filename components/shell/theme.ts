/** The theme: chosen by the person (a cookie, so that the first byte is right) or taken from the system. */
export const THEME_COOKIE = "slackwater.theme";
export type Theme = "light" | "dark" | "system";

export const themeOf = (value: string | undefined): Theme => (value === "light" || value === "dark" ? value : "system");

/** Runs before the first paint when no theme has been chosen. */
export const themeScript = `document.documentElement.dataset.theme = matchMedia("(prefers-color-scheme: dark)").matches ? "dark" : "light";`;
