import Link from "next/link";
import type { ScenarioFilter, ScenarioList } from "@/db/queries/scenarios";
import { filterHref } from "./filter";

const KEYS = [
  [["J", "K"], "move"],
  [["Enter"], "open"],
  [["D"], "duplicate"],
  [["E"], "export"],
  [["N"], "new"],
  [["/"], "search"],
] as const;

type Props = { list: ScenarioList; filter: ScenarioFilter; pageSize: number; areKeysOn: boolean; onKeys: (areOn: boolean) => void };

/** The foot of the list: its keys, with their switch, and the pages. */
export function ListFoot({ list, filter, pageSize, areKeysOn, onKeys }: Props) {
  const first = (list.page - 1) * pageSize + 1;
  return (
    <footer className="sticky bottom-0 mt-auto flex min-h-[27px] items-center gap-[18px] border-t border-ink bg-paper text-[12px] whitespace-nowrap text-ink2 max-[719px]:min-h-14">
      <span className="flex items-center gap-[18px] max-[999px]:hidden">
        {areKeysOn &&
          KEYS.map(([keys, deed]) => (
            <span key={deed}>
              {keys.map((key) => (
                <kbd key={key} className="mr-1">
                  {key}
                </kbd>
              ))}
              {deed}
            </span>
          ))}
        <button type="button" className="underline decoration-edge underline-offset-3" aria-pressed={areKeysOn} onClick={() => onKeys(!areKeysOn)}>
          Letter keys {areKeysOn ? "on" : "off"}
        </button>
      </span>
      <span className="grow" />
      {list.total > 0 && (
        <span>
          {first}–{first + list.rows.length - 1} of {list.total}
        </span>
      )}
      {list.page > 1 && <Link href={filterHref(filter, { page: list.page - 1 })}>Previous</Link>}
      {list.page < list.pageCount && <Link href={filterHref(filter, { page: list.page + 1 })}>Next</Link>}
    </footer>
  );
}
