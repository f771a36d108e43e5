"use client";

import { useEffect, useRef, type RefObject } from "react";
import { isDirty } from "./checked-document";
import { useWorkbench } from "./provider";
import type { Opened } from "./workbench-dialogs";

const isTyping = (target: EventTarget | null): boolean =>
  target instanceof HTMLElement && target.closest("input, select, textarea, [contenteditable]") !== null;
/** A text field that holds something not taken yet undoes its own typing. */
const isPending = (target: EventTarget | null): boolean =>
  target instanceof HTMLElement && target.closest("[data-pending], textarea, [role=dialog]") !== null;

/** Keys that act wherever the focus is: undo, redo, save, run again, the map of keys, the next region. */
export function usePageKeys(
  root: RefObject<HTMLElement | null>,
  opened: Opened | null,
  onOpen: (dialog: Opened) => void,
): void {
  const { store, runNow, cancelRun } = useWorkbench();
  const latest = useRef({ opened, onOpen });
  useEffect(() => {
    latest.current = { opened, onOpen };
  });
  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.defaultPrevented || latest.current.opened !== null) return;
      const state = store.getState();
      const isControl = event.ctrlKey || event.metaKey;
      const key = event.key.toLowerCase();
      if (isControl && key === "z" && !isPending(event.target)) event.shiftKey ? state.redo() : state.undo();
      else if (isControl && key === "y" && !isPending(event.target)) state.redo();
      else if (isControl && key === "s" && state.mode === "edit") {
        if (isDirty(state)) latest.current.onOpen(state.save.conflict ? "conflict" : "save");
        else state.say("Everything is saved");
      } else if (isControl && event.key === "Enter") runNow();
      else if (event.key === "Escape" && state.run.phase === "recomputing" && state.run.isSlow) cancelRun();
      else if (event.key === "F6") focusNextRegion(root.current, event.shiftKey ? -1 : 1);
      else if (event.key === "?" && state.areLettersOn && !isTyping(event.target)) latest.current.onOpen("keys");
      else return;
      event.preventDefault();
    };
    window.addEventListener("keydown", onKeyDown);
    return () => window.removeEventListener("keydown", onKeyDown);
  }, [root, store, runNow, cancelRun]);
}

/** F6 goes round the regions that are in sight. */
function focusNextRegion(root: HTMLElement | null, direction: 1 | -1): void {
  const regions = [...(root?.querySelectorAll<HTMLElement>("[data-region]") ?? [])].filter(
    (region) => !region.closest("[hidden]"),
  );
  if (regions.length === 0) return;
  const at = regions.findIndex((region) => region.contains(document.activeElement));
  const next = at < 0 ? (direction === 1 ? 0 : regions.length - 1) : (at + direction + regions.length) % regions.length;
  regions[next]?.focus();
}
