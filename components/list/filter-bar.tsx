"use client";

import Link from "next/link";
import { useRouter } from "next/navigation";
import type { ScenarioFilter, ScenarioList, ScenarioState } from "@/db/queries/scenarios";
import { SearchSign } from "@/components/ui/signs";
import { filterHref } from "./filter";
import { STATE_WORDS } from "./words";

const SHOWN_STATES: readonly ScenarioState[] = ["draft", "inReview", "approved"];

/** Search, state, owner and tag; all of it is in the address, so that a filtered list can be sent. */
export function FilterBar({ list, filter, areKeysOn }: { list: ScenarioList; filter: ScenarioFilter; areKeysOn: boolean }) {
  const router = useRouter();
  const { counts, owners, tags } = list;
  const go = (change: Partial<ScenarioFilter>) => router.push(filterHref(filter, change));
  return (
    <div className="mt-4 flex flex-wrap items-center gap-3">
      <form
        role="search"
        className="relative w-[320px] max-[719px]:w-full"
        onSubmit={(event) => {
          event.preventDefault();
          go({ search: String(new FormData(event.currentTarget).get("q") ?? "").trim() || undefined });
        }}
      >
        <label className="visually-hidden" htmlFor="scenario-search">
          Search by name, owner or tag
        </label>
        <span className="pointer-events-none absolute top-1/2 left-[11px] -translate-y-1/2">
          <SearchSign />
        </span>
        <input id="scenario-search" key={filter.search ?? ""} name="q" type="search" className="text-input h-8! px-8!" placeholder="Name, owner, tag" defaultValue={filter.search ?? ""} />
        {areKeysOn && !filter.search && (
          <kbd aria-hidden className="pointer-events-none absolute top-1/2 right-[10px] -translate-y-1/2 max-[999px]:hidden">
            /
          </kbd>
        )}
      </form>
      <nav aria-label="State" className="button-group max-[719px]:w-full max-[719px]:overflow-x-auto">
        <StateLink filter={filter} change={{ state: undefined, archived: false }} isOn={!filter.state && !filter.archived} label={`All ${counts.all}`} />
        {SHOWN_STATES.map((state) => (
          <StateLink key={state} filter={filter} change={{ state, archived: false }} isOn={filter.state === state} label={`${STATE_WORDS[state]} ${counts[state]}`} />
        ))}
        <StateLink filter={filter} change={{ state: undefined, archived: true }} isOn={filter.archived === true} label={`Archived ${counts.archived}`} />
      </nav>
      <Choice label="Owner" value={filter.owner ?? ""} options={[["", "anyone"], ["me", "me"], ...owners.map((one): [string, string] => [one.id, one.name])]} onChange={(owner) => go({ owner: owner || undefined })} />
      <Choice label="Tag" value={filter.tag ?? ""} options={[["", "any"], ...tags.map((tag): [string, string] => [tag, tag])]} onChange={(tag) => go({ tag: tag || undefined })} />
      <span className="grow" />
      <span className="text-ink3 max-[1199px]:hidden">Sorted by last change</span>
    </div>
  );
}

function StateLink({ filter, change, isOn, label }: { filter: ScenarioFilter; change: Partial<ScenarioFilter>; isOn: boolean; label: string }) {
  return (
    <Link className="button h-8!" href={filterHref(filter, change)} aria-current={isOn ? "true" : undefined} prefetch={false}>
      {label}
    </Link>
  );
}

function Choice({ label, value, options, onChange }: { label: string; value: string; options: [string, string][]; onChange: (value: string) => void }) {
  return (
    <label className="flex items-center gap-1">
      <span>{label}:</span>
      <select className="h-[28px] [field-sizing:content] max-w-48 border-0 bg-transparent font-medium max-[719px]:h-11 max-[719px]:text-[16px]" value={value} onChange={(event) => onChange(event.target.value)}>
        {options.map(([key, text]) => (
          <option key={key} value={key} className="bg-sheet">
            {text}
          </option>
        ))}
      </select>
    </label>
  );
}
