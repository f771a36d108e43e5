"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { reach } from "@/components/scenario/saving";
import { errorText } from "@/lib/errors";
import type { Finding } from "@/lib/result";
import { upgradeScenario } from "@/lib/scenario/upgrade";
import type { ListActions } from "./list-actions";

/** Far above any scenario; a larger file is not one. */
const FILE_MAX_BYTES = 4_000_000;

/** Makes a scenario from a document, by file or pasted; a refused one names every problem and loses nothing. */
export function ImportScenario({ createScenario, onClose }: { createScenario: ListActions["createScenario"]; onClose: () => void }) {
  const router = useRouter();
  const [text, setText] = useState("");
  const [problem, setProblem] = useState<{ text: string; findings: Finding[] } | null>(null);
  const [isBusy, setBusy] = useState(false);

  async function take() {
    let value: unknown;
    try {
      value = JSON.parse(text);
    } catch (cause) {
      return setProblem({ text: `This is not valid JSON: ${cause instanceof Error ? cause.message : String(cause)}`, findings: [] });
    }
    const parsed = upgradeScenario(value);
    if (!parsed.ok) return setProblem({ text: `${parsed.findings.length === 1 ? "One value" : `${parsed.findings.length} values`} cannot be taken. Correct them here or in the file.`, findings: parsed.findings });
    setBusy(true);
    const result = await reach(() => createScenario({ document: parsed.document, title: parsed.document.title }));
    if (result.ok) return router.push(`/scenarios/${result.value.id}`);
    setBusy(false);
    setProblem({ text: errorText(result.code), findings: result.findings ?? [] });
  }
  return (
    <Dialog isOpen size="wide" onClose={onClose} title="Import a scenario" description="A scenario document as JSON, from a file or pasted.">
      <input
        type="file"
        aria-label="File"
        accept="application/json,.json"
        className="max-w-full text-ink2 file:mr-3 file:h-7 file:rounded-control file:border file:border-solid file:border-edge file:bg-sheet file:px-[11px] file:font-medium file:text-ink max-[719px]:file:h-11"
        onChange={async (event) => {
          const file = event.currentTarget.files?.[0];
          if (!file) return;
          if (file.size > FILE_MAX_BYTES) return setProblem({ text: `${file.name} is larger than any scenario.`, findings: [] });
          setText(await file.text());
          setProblem(null);
        }}
      />
      <label className="text-field mt-4">
        <span>Document</span>
        <textarea className="text-input font-mono" rows={9} value={text} spellCheck={false} onChange={(event) => setText(event.target.value)} aria-invalid={problem !== null || undefined} />
      </label>
      {problem && (
        <div role="alert" className="mt-3">
          <p className="font-medium text-fault">{problem.text}</p>
          <ul tabIndex={0} aria-label="What cannot be taken" className="mt-2 max-h-52 overflow-auto border-t border-rule">
            {problem.findings.map((finding) => (
              <li key={`${finding.path} ${finding.code}`} className="border-b border-rule py-1">
                <code className="text-ink3">{finding.path}</code> {finding.text}
              </li>
            ))}
          </ul>
        </div>
      )}
      <div className="mt-5 flex gap-3">
        <Button kind="primary" disabled={isBusy || text.trim() === ""} onClick={() => void take()}>
          {isBusy ? "Importing…" : "Import the scenario"}
        </Button>
        <Button kind="quiet" onClick={onClose}>
          Cancel
        </Button>
      </div>
    </Dialog>
  );
}
