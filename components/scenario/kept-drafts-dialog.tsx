"use client";

import { useEffect, useState } from "react";
import { Dialog } from "@/components/ui/dialog";
import type { KeptDraft } from "@/db/queries/revisions";
import { errorText } from "@/lib/errors";
import { diffDocuments } from "@/lib/scenario/diff";
import { useScenario, useWorkbench } from "./provider";
import { formatMoment } from "./saved-words";
import { reach } from "./saving";
import { useNow } from "./use-now";
import styles from "./controls.module.css";

/** One's own versions that came second and were not saved: each can be brought back into the draft. */
export function KeptDraftsDialog({ onClose }: { onClose: () => void }) {
  const { store, actions } = useWorkbench();
  const scenarioId = useScenario((state) => state.scenarioId);
  const base = useScenario((state) => state.base);
  const [drafts, setDrafts] = useState<KeptDraft[] | null>(null);
  const [problem, setProblem] = useState<string | null>(null);
  const { listKeptDrafts } = actions;
  const nowMs = useNow() ?? 0;
  useEffect(() => {
    if (scenarioId === null || !listKeptDrafts) return;
    let isAlive = true;
    void reach(() => listKeptDrafts({ scenarioId })).then((result) => {
      if (!isAlive) return;
      if (result.ok) setDrafts(result.value);
      else setProblem(errorText(result.code));
    });
    return () => {
      isAlive = false;
    };
  }, [scenarioId, listKeptDrafts]);
  const bringBack = (draft: KeptDraft) => {
    store.getState().replaceDocument(draft.document, `bring back the draft on rev ${draft.baseNumber}`);
    onClose();
  };
  return (
    <Dialog
      isOpen
      size="wide"
      title="Kept drafts"
      description="Your own versions that someone else's revision came before. Bringing one back puts it into the draft; nothing is saved by it."
      onClose={onClose}
    >
      {problem && (
        <p role="alert" className={styles.problem}>
          {problem}
        </p>
      )}
      {drafts === null && !problem && <p>Looking …</p>}
      {drafts?.length === 0 && <p>There are none.</p>}
      {drafts && drafts.length > 0 && (
        <table className={styles.table}>
          <thead>
            <tr>
              <th scope="col">Kept</th>
              <th scope="col">Started from</th>
              <th scope="col">Differs from rev {base.number} in</th>
              <th scope="col">
                <span className="visually-hidden">Bring back</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {drafts.map((draft) => {
              const changes = diffDocuments(base.document, draft.document);
              return (
                <tr key={draft.id}>
                  <td>{formatMoment(new Date(draft.createdAt).getTime(), nowMs)}</td>
                  <td>rev {draft.baseNumber}</td>
                  <td>
                    {changes
                      .slice(0, 3)
                      .map((one) => one.text)
                      .join("; ") || "nothing"}
                  </td>
                  <td>
                    <button type="button" className="button" onClick={() => bringBack(draft)}>
                      Bring back
                    </button>
                  </td>
                </tr>
              );
            })}
          </tbody>
        </table>
      )}
    </Dialog>
  );
}
