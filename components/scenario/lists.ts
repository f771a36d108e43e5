import { getAt } from "@/lib/scenario/paths";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { ROWS_MAX, type ListPath } from "@/lib/scenario/starts";

/** The lists of a document that the panel edits row by row. */
export type ListInfo = {
  path: ListPath;
  section: "command" | "shaft" | "faults";
  title: string;
  row: string;
  add: string;
};

export const LISTS: readonly ListInfo[] = [
  { path: "command.points", section: "command", title: "Command points", row: "Point", add: "Add a command point" },
  {
    path: "command.special",
    section: "command",
    title: "Special intervals",
    row: "Interval",
    add: "Add a special interval",
  },
  { path: "load.shaft", section: "shaft", title: "Shaft loads", row: "Load", add: "Add a shaft load" },
  { path: "faults", section: "faults", title: "Faults", row: "Fault", add: "Add a fault" },
];

export function rowsOf(document: ScenarioDocument, path: ListPath): readonly unknown[] {
  const rows = getAt(document, path);
  return Array.isArray(rows) ? rows : [];
}

export const canAddRow = (document: ScenarioDocument, path: ListPath): boolean =>
  rowsOf(document, path).length < ROWS_MAX[path] && (path !== "load.shaft" || document.load.kind === "motor");

/** A run needs a command from the start. */
export const canRemoveRow = (path: ListPath, index: number): boolean => path !== "command.points" || index > 0;
