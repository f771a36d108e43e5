"use client";

import { useState } from "react";
import { Dialog } from "@/components/ui/dialog";
import { TextField } from "@/components/ui/text-field";
import { diffDocuments } from "@/lib/scenario/diff";
import { useScenario, useWorkbench } from "./provider";
import { saveDraft } from "./saving";
import styles from "./controls.module.css";

const MOST = 8;

/** Names and saves a revision; the message is optional. */
export function SaveDialog({ onClose }: { onClose: () => void }) {
  const { store, actions } = useWorkbench();
  const [message, setMessage] = useState("");
  const base = useScenario((state) => state.base);
  const document = useScenario((state) => state.document);
  const isSaving = useScenario((state) => state.save.isSaving);
  const problem = useScenario((state) => state.save.problem);
  const hasFindings = useScenario((state) => state.findings.length > 0);
  const changes = diffDocuments(base.document, document);
  const save = async () => {
    const isSaved = await saveDraft(store, actions, message.trim());
    if (isSaved || store.getState().save.conflict) onClose();
  };
  return (
    <Dialog
      isOpen
      title={`Save rev ${base.number + 1}`}
      description="A revision never changes again: everyone in the workspace sees it, and nobody can lose it."
      onClose={onClose}
    >
      <form
        onSubmit={(event) => {
          event.preventDefault();
          void save();
        }}
      >
        <ul className={styles.changes}>
          {changes.slice(0, MOST).map((change) => (
            <li key={change.path}>{change.text}</li>
          ))}
          {changes.length > MOST && <li>and {changes.length - MOST} more</li>}
        </ul>
        <TextField
          id="revision-message"
          label="What is it about?"
          hint="May be left empty."
          value={message}
          maxLength={500}
          autoFocus
          onChange={(event) => setMessage(event.currentTarget.value)}
        />
        {hasFindings && (
          <p className={styles.problem}>
            Some values do not fit together yet, so this cannot be saved. They are listed under Notices; your work is
            kept in this browser.
          </p>
        )}
        {problem && (
          <p role="alert" className={styles.problem}>
            {problem.text}
          </p>
        )}
        <div className={styles.actions}>
          <button type="button" className="button" onClick={onClose}>
            Keep editing
          </button>
          <button
            type="submit"
            className="button"
            data-kind="primary"
            disabled={isSaving || hasFindings || changes.length === 0}
          >
            {isSaving ? "Saving …" : `Save rev ${base.number + 1}`}
          </button>
        </div>
      </form>
    </Dialog>
  );
}
