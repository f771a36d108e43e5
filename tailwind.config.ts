import type { Config } from "tailwindcss";

// Every colour is a variable of app/globals.css, so that a theme changes all of them at once and a drawing can use the same names.
const hues = [
  "ground", "paper", "sheet", "sunk",
  "ink", "ink2", "ink3", "rule", "edge", "on-ink", "focus",
  "fwd", "fwd-fill", "fwd-tint",
  "rev", "rev-fill", "rev-tint",
  "ref", "ref-tint",
  "fault", "fault-tint",
  "caution", "caution-tint",
];

const config: Config = {
  content: ["./app/**/*.{ts,tsx}", "./components/**/*.{ts,tsx}"],
  darkMode: ["selector", '[data-theme="dark"]'],
  theme: {
    colors: {
      transparent: "transparent",
      current: "currentColor",
      ...Object.fromEntries(hues.map((hue) => [hue, `var(--${hue})`])),
    },
    fontFamily: { sans: ["var(--sans)"], serif: ["var(--serif)"] },
    // 3 px for controls, 2 px for tags, square for everything else
    borderRadius: { none: "0", tag: "2px", control: "3px", full: "9999px" },
    extend: {
      // page head, the border under it, sub-head, footer
      height: { head: "46px", border: "7px", subhead: "44px", foot: "27px" },
      screens: { phone: { max: "719px" }, narrow: { max: "1099px" } },
    },
  },
};

export default config;
