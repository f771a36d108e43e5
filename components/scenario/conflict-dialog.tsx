"use client";

import { Dialog } from "@/components/ui/dialog";
import { diffDocuments, labelOf, valueText } from "@/lib/scenario/diff";
import { getAt } from "@/lib/scenario/paths";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { useScenario, useWorkbench } from "./provider";
import { keepMine } from "./saving";
import styles from "./controls.module.css";

export type ComparedRow = {
  path: string;
  label: string;
  base: string;
  theirs: string;
  mine: string;
  isTheirs: boolean;
  isMine: boolean;
};

/** Every input that one of the two changed: before, theirs, mine. */
export function compareThree(base: ScenarioDocument, theirs: ScenarioDocument, mine: ScenarioDocument): ComparedRow[] {
  const ofTheirs = diffDocuments(base, theirs).map((one) => one.path);
  const ofMine = diffDocuments(base, mine).map((one) => one.path);
  return [...new Set([...ofTheirs, ...ofMine])].map((path) => ({
    path,
    label: labelOf(path, mine),
    base: valueText(path, getAt(base, path), base),
    theirs: valueText(path, getAt(theirs, path), theirs),
    mine: valueText(path, getAt(mine, path), mine),
    isTheirs: ofTheirs.includes(path),
    isMine: ofMine.includes(path),
  }));
}

/** Two people, one draft: what each changed, and the two ways on. Nobody's work is lost either way. */
export function ConflictDialog({ onClose }: { onClose: () => void }) {
  const { store, actions } = useWorkbench();
  const conflict = useScenario((state) => state.save.conflict);
  const base = useScenario((state) => state.base);
  const mine = useScenario((state) => state.document);
  const isSaving = useScenario((state) => state.save.isSaving);
  const problem = useScenario((state) => state.save.problem);
  if (!conflict) return null;
  const { newest } = conflict;
  const rows = compareThree(base.document, newest.document, mine);
  const keep = async () => {
    if (await keepMine(store, actions)) onClose();
  };
  const take = () => {
    store.getState().takeTheirs();
    store.getState().say(`Showing rev ${newest.number}; yours is kept as a draft`, true);
    onClose();
  };
  return (
    <Dialog
      isOpen
      size="wide"
      title={`${newest.authorName} saved rev ${newest.number} while you were editing rev ${base.number}`}
      description="Both versions are kept. Where both changed the same input, both values stand in the row."
      onClose={onClose}
    >
      <table className={styles.table}>
        <thead>
          <tr>
            <th scope="col">Input</th>
            <th scope="col">rev {base.number}</th>
            <th scope="col">
              rev {newest.number}, {newest.authorName}
            </th>
            <th scope="col">yours</th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={row.path}>
              <td>{row.label}</td>
              <td>{row.base}</td>
              <td data-changed={row.isTheirs || undefined}>{row.theirs}</td>
              <td data-changed={row.isMine || undefined}>{row.mine}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {problem && (
        <p role="alert" className={styles.problem}>
          {problem.text}
        </p>
      )}
      <div className={styles.actions}>
        <button type="button" className="button" onClick={take}>
          Take rev {newest.number}, keep mine as a draft
        </button>
        <button type="button" className="button" data-kind="primary" disabled={isSaving} onClick={() => void keep()}>
          Keep mine as rev {newest.number + 1}
        </button>
      </div>
    </Dialog>
  );
}
