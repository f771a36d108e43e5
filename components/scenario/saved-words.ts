const DAY_MS = 24 * 3600 * 1000;
const clock = new Intl.DateTimeFormat("en-GB", { hour: "2-digit", minute: "2-digit" });
const day = new Intl.DateTimeFormat("en-GB", { day: "numeric", month: "short" });
const dayOfYear = new Intl.DateTimeFormat("en-GB", { day: "numeric", month: "short", year: "numeric" });

/** "14:02" today, "4 May, 14:02" this year, "4 May 2026" before. */
export function formatMoment(atMs: number, nowMs: number): string {
  const [at, now] = [new Date(atMs), new Date(nowMs)];
  if (at.toDateString() === now.toDateString()) return clock.format(at);
  if (nowMs - atMs < 300 * DAY_MS) return `${day.format(at)}, ${clock.format(at)}`;
  return dayOfYear.format(at);
}

type SavedFacts = {
  number: number;
  savedAtMs: number;
  changeCount: number;
  isOffline: boolean;
  mode: "edit" | "read" | "guest";
  nowMs: number;
};

/** What is saved and what is not, always said: "rev 7 · saved 14:02", "rev 7 · 3 changes not saved", "Working here; not saved since 14:02". */
export function savedWords({ number, savedAtMs, changeCount, isOffline, mode, nowMs }: SavedFacts): string {
  const moment = formatMoment(savedAtMs, nowMs);
  const changes = changeCount === 1 ? "1 change" : `${changeCount} changes`;
  // a link names its revision, not its hour
  if (changeCount === 0 && mode === "guest") return `rev ${number}`;
  if (changeCount === 0) return `rev ${number} · saved ${moment}`;
  if (mode === "guest") return `rev ${number} · ${changes}, nothing is kept`;
  if (mode === "read") return `rev ${number} · ${changes}, kept here only`;
  if (isOffline) return `Working here; not saved since ${moment}`;
  return `rev ${number} · ${changes} not saved`;
}
