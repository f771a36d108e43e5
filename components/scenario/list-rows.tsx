"use client";

import { rowInputs, type Input } from "@/lib/scenario/inputs";
import { formatQuantity } from "@/lib/units/format";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { canAddRow, canRemoveRow, rowsOf, type ListInfo } from "./lists";
import { InputRows } from "./input-rows";
import { useScenario, useWorkbench } from "./provider";
import styles from "./inputs.module.css";

/** A list of the document: each entry a group of rows with its own way out, and one button to add. */
export function ListRows({ list }: { list: ListInfo }) {
  const { store } = useWorkbench();
  const document = useScenario((state) => state.document);
  const isLocked = useScenario((state) => state.isLocked);
  const problem = useScenario(
    (state) =>
      state.findings.find(
        (finding) => finding.path === list.path || /^\d+$/.test(finding.path.slice(list.path.length + 1)),
      )?.text,
  );
  const rows = rowsOf(document, list.path);
  const name = list.row.toLowerCase();
  const remove = (index: number) => {
    store.getState().removeRow(list.path, index, `remove ${name} ${index + 1}`);
    store.getState().say(`${list.row} ${index + 1} removed`, true);
  };
  return (
    <div className={styles.list} role="group" aria-label={list.title}>
      {rows.map((_, index) => (
        <div key={index} className={styles.entry} role="group" aria-label={`${list.row} ${index + 1}`}>
          {canRemoveRow(list.path, index) && (
            <div className={styles.entryHead}>
              <span>{entryTitle(list, document, index)}</span>
              {!isLocked && (
                <button
                  type="button"
                  className={styles.remove}
                  aria-label={`Remove ${name} ${index + 1}`}
                  onClick={() => remove(index)}
                >
                  Remove
                </button>
              )}
            </div>
          )}
          <InputRows inputs={rowInputs(list.path, index, document)} labelOf={(input) => rowLabel(list, input, index)} />
        </div>
      ))}
      {problem && (
        <p role="alert" className={styles.problem}>
          {problem}
        </p>
      )}
      {!isLocked && canAddRow(document, list.path) && (
        <button
          type="button"
          className={styles.add}
          onClick={() => store.getState().addRow(list.path, list.add.toLowerCase())}
        >
          {list.add}
        </button>
      )}
    </div>
  );
}

function rowLabel(list: ListInfo, input: Input, index: number): string {
  return list.path === "command.points" && index === 0 ? `${input.label} at the start` : input.label;
}

function entryTitle(list: ListInfo, document: ScenarioDocument, index: number): string {
  if (list.path !== "command.points") return `${list.row} ${index + 1}`;
  const point = document.command.points[index];
  if (!point) return "";
  return `${point.ramp === "linear" ? "Reached at" : "From"} ${formatQuantity(point.timeS, "s", { digits: 4 }).text}`;
}
