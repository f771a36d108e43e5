"use client";

import { useSyncExternalStore } from "react";

export type Layout = "wide" | "narrow" | "phone";

const PHONE = "(max-width: 719px)";
const NARROW = "(max-width: 1099px)";

function subscribe(onChange: () => void): () => void {
  const lists = [PHONE, NARROW].map((query) => window.matchMedia?.(query));
  lists.forEach((list) => list?.addEventListener("change", onChange));
  return () => lists.forEach((list) => list?.removeEventListener("change", onChange));
}

const readLayout = (): Layout =>
  window.matchMedia?.(PHONE).matches ? "phone" : window.matchMedia?.(NARROW).matches ? "narrow" : "wide";

/** look.md section 4: below 1100 px the right column becomes a tab, below 720 px the page is a phone's. */
export const useLayout = (): Layout => useSyncExternalStore(subscribe, readLayout, () => "wide");
