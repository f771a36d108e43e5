"use client";

import { useState } from "react";
import { Dialog } from "@/components/ui/dialog";
import { TextField } from "@/components/ui/text-field";
import { errorText } from "@/lib/errors";
import { useScenario, useWorkbench } from "./provider";
import { reach } from "./saving";
import styles from "./controls.module.css";

/** Title and tags belong to the scenario, not to a revision: they are changed at once. */
export function IdentityDialog({ onClose }: { onClose: () => void }) {
  const { store, actions } = useWorkbench();
  const scenarioId = useScenario((state) => state.scenarioId);
  const [title, setTitle] = useState(() => store.getState().title);
  const [tags, setTags] = useState(() => store.getState().tags.join(", "));
  const [problem, setProblem] = useState<string | null>(null);
  const [isBusy, setBusy] = useState(false);
  const apply = async () => {
    const { renameScenario, setTags: tag } = actions;
    if (scenarioId === null || !renameScenario || !tag) return;
    setBusy(true);
    setProblem(null);
    const state = store.getState();
    const wanted = tags
      .split(",")
      .map((one) => one.trim())
      .filter(Boolean);
    if (title.trim() !== state.title) {
      const result = await reach(() => renameScenario({ scenarioId, title }));
      if (!result.ok) return fail(result.findings?.[0]?.text ?? errorText(result.code));
      store.getState().setIdentity({ title: result.value.title });
    }
    if (wanted.join("\n") !== state.tags.join("\n")) {
      const result = await reach(() => tag({ scenarioId, tags: wanted }));
      if (!result.ok) return fail(result.findings?.[0]?.text ?? errorText(result.code));
      store.getState().setIdentity({ tags: result.value.tags });
    }
    onClose();
  };
  const fail = (text: string) => {
    setBusy(false);
    setProblem(text);
  };
  return (
    <Dialog
      isOpen
      title="Title and tags"
      description="They belong to the scenario and change for everyone at once."
      onClose={onClose}
    >
      <form
        onSubmit={(event) => {
          event.preventDefault();
          void apply();
        }}
      >
        <div className={styles.fields}>
          <TextField
            id="scenario-title"
            label="Title"
            value={title}
            maxLength={120}
            required
            onChange={(event) => setTitle(event.currentTarget.value)}
          />
          <TextField
            id="scenario-tags"
            label="Tags"
            hint="Separated by commas, twelve at most."
            value={tags}
            onChange={(event) => setTags(event.currentTarget.value)}
          />
        </div>
        {problem && (
          <p role="alert" className={styles.problem}>
            {problem}
          </p>
        )}
        <div className={styles.actions}>
          <button type="button" className="button" onClick={onClose}>
            Cancel
          </button>
          <button type="submit" className="button" data-kind="primary" disabled={isBusy}>
            Change title and tags
          </button>
        </div>
      </form>
    </Dialog>
  );
}
