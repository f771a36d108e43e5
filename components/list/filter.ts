import type { ScenarioFilter, ScenarioState } from "@/db/queries/scenarios";

export type SearchParams = Record<string, string | string[] | undefined>;

const STATES: readonly ScenarioState[] = ["draft", "inReview", "approved", "superseded"];
const one = (value: string | string[] | undefined) => (Array.isArray(value) ? value[0] : value) || undefined;

/** The filter that an address names; what it does not know is left out. */
export function readFilter(params: SearchParams): ScenarioFilter {
  const state = one(params.state);
  return {
    search: one(params.q),
    owner: one(params.owner),
    tag: one(params.tag),
    state: STATES.find((known) => known === state),
    archived: one(params.archived) === "1",
    page: Math.max(1, Math.trunc(Number(one(params.page))) || 1),
  };
}

/** The address of a filter, with some of it changed; any change but of the page goes back to page 1. */
export function filterHref(filter: ScenarioFilter, change: Partial<ScenarioFilter>): string {
  const next = { ...filter, page: 1, ...change };
  const params = new URLSearchParams();
  if (next.search) params.set("q", next.search);
  if (next.owner) params.set("owner", next.owner);
  if (next.tag) params.set("tag", next.tag);
  if (next.state) params.set("state", next.state);
  if (next.archived) params.set("archived", "1");
  if (next.page > 1) params.set("page", String(next.page));
  const query = params.toString();
  return query ? `/scenarios?${query}` : "/scenarios";
}
