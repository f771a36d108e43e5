"use client";

import { useSyncExternalStore } from "react";
import type { ThemeName } from "@/components/plot/theme";

const DARK = "(prefers-color-scheme: dark)";

function subscribe(onChange: () => void): () => void {
  const observer = new MutationObserver(onChange);
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ["data-theme"] });
  const media = window.matchMedia?.(DARK);
  media?.addEventListener("change", onChange);
  return () => {
    observer.disconnect();
    media?.removeEventListener("change", onChange);
  };
}

const readName = (): ThemeName => {
  const { theme } = document.documentElement.dataset;
  if (theme === "dark" || theme === "light") return theme;
  return window.matchMedia?.(DARK).matches ? "dark" : "light";
};

/** The theme in force, for what is drawn on a canvas. */
export const useThemeName = (): ThemeName => useSyncExternalStore(subscribe, readName, () => "light");
