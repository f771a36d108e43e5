"use client";

import { useSyncExternalStore } from "react";
import { THEME_COOKIE } from "./theme";

const current = () => (document.documentElement.dataset.theme === "dark" ? "dark" : "light");

function subscribe(onChange: () => void): () => void {
  const observer = new MutationObserver(onChange);
  observer.observe(document.documentElement, { attributeFilter: ["data-theme"] });
  return () => observer.disconnect();
}

/** Switches between the two themes and remembers the choice for a year. */
export function ThemeSwitch() {
  const theme = useSyncExternalStore(subscribe, current, () => "light");
  const next = theme === "dark" ? "light" : "dark";
  return (
    <button
      type="button"
      className="button"
      data-kind="quiet"
      aria-label={`Theme: ${theme}. Switch to ${next}`}
      onClick={() => {
        document.documentElement.dataset.theme = next;
        document.cookie = `${THEME_COOKIE}=${next}; path=/; max-age=31536000; samesite=lax`;
      }}
    >
      <span className="max-[719px]:hidden">Theme: {theme}</span>
      <span className="min-[720px]:hidden" aria-hidden>◐</span>
    </button>
  );
}
