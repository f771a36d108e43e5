"use client";

import { useState } from "react";
import { Dialog } from "@/components/ui/dialog";
import { TextField } from "@/components/ui/text-field";
import type { Finding } from "@/lib/result";
import { labelOf } from "@/lib/scenario/diff";
import { upgradeScenario } from "@/lib/scenario/upgrade";
import { useScenario, useWorkbench } from "./provider";
import styles from "./controls.module.css";

/** Far above any scenario; a larger file is not one. */
const FILE_MAX = 4_000_000;

type Problem = { text: string; findings: Finding[] };

/** Takes a document from a file in the place of the draft: one step that undo takes back. A refused file names every problem. */
export function ImportDialog({ onClose }: { onClose: () => void }) {
  const { store } = useWorkbench();
  const document = useScenario((state) => state.document);
  const [problem, setProblem] = useState<Problem | null>(null);
  const read = async (file: File | undefined) => {
    if (!file) return;
    if (file.size > FILE_MAX) return setProblem({ text: `${file.name} is larger than any scenario.`, findings: [] });
    const json = parseJson(await file.text());
    if (!json.ok) return setProblem({ text: `${file.name} is not valid JSON: ${json.text}`, findings: [] });
    const parsed = upgradeScenario(json.value);
    if (!parsed.ok)
      return setProblem({
        text: `${file.name} has ${parsed.findings.length === 1 ? "a value" : `${parsed.findings.length} values`} that cannot be taken. Nothing was changed.`,
        findings: parsed.findings,
      });
    store.getState().replaceDocument(parsed.document, `import of ${file.name}`);
    store.getState().say(`${file.name} is in the draft, not saved yet`, true);
    onClose();
  };
  return (
    <Dialog
      isOpen
      {...(problem ? { size: "wide" as const } : {})}
      title="Import a document"
      description="A scenario document as JSON takes the place of the draft. Undo brings the draft back."
      onClose={onClose}
    >
      <TextField
        id="document-file"
        label="File"
        type="file"
        accept="application/json,.json"
        onChange={(event) => void read(event.currentTarget.files?.[0])}
      />
      {problem && (
        <div role="alert">
          <p className={styles.problem}>{problem.text}</p>
          {problem.findings.length > 0 && (
            <table className={styles.table}>
              <thead>
                <tr>
                  <th scope="col">Field</th>
                  <th scope="col">What is wrong</th>
                </tr>
              </thead>
              <tbody>
                {problem.findings.map((finding) => (
                  <tr key={`${finding.path} ${finding.code}`}>
                    <td>
                      {labelOf(finding.path, document)}
                      <br />
                      <code>{finding.path}</code>
                    </td>
                    <td>{finding.text}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          )}
        </div>
      )}
    </Dialog>
  );
}

function parseJson(text: string): { ok: true; value: unknown } | { ok: false; text: string } {
  try {
    return { ok: true, value: JSON.parse(text) as unknown };
  } catch (cause) {
    // the parser's own words say where
    return { ok: false, text: cause instanceof Error ? cause.message : String(cause) };
  }
}
