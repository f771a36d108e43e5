"use client";

import { useEffect, useRef, useState } from "react";
import type { ScenarioRow } from "@/db/queries/scenarios";
import type { RowDeeds } from "./row-menu";
import { linkId } from "./words";

type Deeds = Pick<RowDeeds, "onDuplicate" | "onExport"> & { onNew: () => void };

const isElsewhere = (target: EventTarget | null) => target instanceof HTMLElement && target.closest("input, textarea, select, [role=dialog], [role=menu]") !== null;

/**
 * J and K move the focus from row to row (Enter then opens, as on any link), D duplicates, E exports, N makes a new one,
 * / goes to the search; nothing while typing, and nothing at all with `areOn` false (WCAG 2.1.4 asks that they can be switched off).
 */
export function useListKeys(rows: ScenarioRow[], areOn: boolean, deeds: Deeds): [number, (index: number) => void] {
  const [chosen, setChosen] = useState(0);
  const current = Math.min(chosen, Math.max(rows.length - 1, 0));
  const latest = useRef({ rows, deeds, current });
  useEffect(() => {
    latest.current = { rows, deeds, current };
  });
  useEffect(() => {
    if (!areOn) return;
    const onKey = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey || isElsewhere(event.target)) return;
      const { rows: now, deeds: call, current: at } = latest.current;
      const row = now[at];
      const key = event.key.toLowerCase();
      if ((key === "j" || key === "k") && row) {
        const isInList = document.activeElement?.closest("tr") !== null && document.activeElement !== null;
        // the first press goes to the row that is marked, the next ones from there
        const to = isInList ? Math.min(Math.max(at + (key === "j" ? 1 : -1), 0), now.length - 1) : at;
        setChosen(to);
        document.getElementById(linkId(now[to]!.id))?.focus();
      } else if (key === "d" && row?.mayDuplicate) call.onDuplicate(row);
      else if (key === "e" && row) call.onExport(row);
      else if (key === "n") call.onNew();
      else if (key === "/") document.getElementById("scenario-search")?.focus();
      else return;
      event.preventDefault();
    };
    window.addEventListener("keydown", onKey);
    return () => window.removeEventListener("keydown", onKey);
  }, [areOn]);
  return [current, setChosen];
}
