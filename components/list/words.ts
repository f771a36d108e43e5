import type { ScenarioState } from "@/db/queries/scenarios";

export const STATE_WORDS: Record<ScenarioState, string> = { draft: "Draft", inReview: "In review", approved: "Approved", superseded: "Superseded" };

/** When something changed, the way people say it: time today, days this week, then the date. `nowMs` and the zone decide. */
export function changedWords(changed: Date, nowMs: number): string {
  const days = Math.floor((startOfDay(nowMs) - startOfDay(changed.getTime())) / 86_400_000);
  if (days <= 0) return changed.toLocaleTimeString("en-GB", { hour: "2-digit", minute: "2-digit" });
  if (days === 1) return "yesterday";
  if (days < 14) return `${days} days ago`;
  return changed.toLocaleDateString("en-GB", { day: "numeric", month: "short", year: "numeric" });
}

const startOfDay = (ms: number) => new Date(ms).setHours(0, 0, 0, 0);
