"use client";

import { useEffect, useRef, useState } from "react";
import type { ScenarioRow } from "@/db/queries/scenarios";

type Deeds = { onNew: () => void; onDuplicate: (row: ScenarioRow) => void; onOpen: (row: ScenarioRow) => void };

const isTyping = (target: EventTarget | null) => target instanceof HTMLElement && (target.matches("input, textarea, select") || target.closest("[role=dialog], [role=menu]") !== null);

/** J and K move through the rows, Enter opens, D duplicates, N makes a new one, / goes to the search; nothing while typing. */
export function useListKeys(rows: ScenarioRow[], deeds: Deeds): [number, (index: number) => void] {
  const [current, setCurrent] = useState(0);
  const latest = useRef({ rows, deeds, current });
  useEffect(() => {
    latest.current = { rows, deeds, current };
  });
  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (event.ctrlKey || event.metaKey || event.altKey || isTyping(event.target)) return;
      const { rows: now, deeds: call, current: at } = latest.current;
      const row = now[at];
      const isOnPage = document.activeElement === document.body || document.activeElement?.id === "main";
      if (event.key === "j") setCurrent(Math.min(at + 1, now.length - 1));
      else if (event.key === "k") setCurrent(Math.max(at - 1, 0));
      else if (event.key === "Enter" && row && isOnPage) call.onOpen(row);
      else if (event.key === "d" && row?.mayDuplicate) call.onDuplicate(row);
      else if (event.key === "n") call.onNew();
      else if (event.key === "/") document.getElementById("scenario-search")?.focus();
      else return;
      event.preventDefault();
    };
    window.addEventListener("keydown", onKey);
    return () => window.removeEventListener("keydown", onKey);
  }, []);
  return [Math.min(current, Math.max(rows.length - 1, 0)), setCurrent];
}
