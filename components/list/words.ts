import type { ScenarioState } from "@/db/queries/scenarios";

export const STATE_WORDS: Record<ScenarioState, string> = { draft: "Draft", inReview: "In review", approved: "Approved", superseded: "Superseded" };

/** Where the keyboard finds the link of a row. */
export const linkId = (scenarioId: string): string => `scenario-${scenarioId}`;

/** When something changed, the way people say it: time today, days this week, then the date. Without `nowMs` (the server does not know the reader's clock) the date. */
export function changedWords(changed: Date, nowMs: number | null): string {
  if (nowMs === null) return changed.toLocaleDateString("en-GB", { day: "numeric", month: "short", year: "numeric", timeZone: "UTC" });
  // a day of the clock's change has 23 or 25 hours
  const days = Math.round((startOfDay(nowMs) - startOfDay(changed.getTime())) / 86_400_000);
  if (days <= 0) return changed.toLocaleTimeString("en-GB", { hour: "2-digit", minute: "2-digit" });
  if (days === 1) return "yesterday";
  if (days < 14) return `${days} days ago`;
  return changed.toLocaleDateString("en-GB", { day: "numeric", month: "short", year: "numeric" });
}

const startOfDay = (ms: number) => new Date(ms).setHours(0, 0, 0, 0);
