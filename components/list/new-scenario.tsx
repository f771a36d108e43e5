"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { TextField } from "@/components/ui/text-field";
import { reach } from "@/components/scenario/saving";
import { errorText } from "@/lib/errors";
import { defaultDocument } from "@/lib/scenario/defaults";
import type { ListActions } from "./list-actions";

export type TemplateChoice = { id: string; title: string; purpose: string; tags: string[] };

/** Without a template: a plain drive in one direction, every value to be entered over. */
const BLANK: TemplateChoice = { id: "", title: "New scenario", purpose: "No template: a plain drive running forward, to enter your own values over.", tags: [] };

type Props = { templates: TemplateChoice[]; createScenario: ListActions["createScenario"]; onClose: () => void };

/** Starts a scenario from one of the templates or from scratch, under a name of one's own. */
export function NewScenario({ templates, createScenario, onClose }: Props) {
  const router = useRouter();
  const [templateId, setTemplateId] = useState(templates[0]!.id);
  const [title, setTitle] = useState("");
  const [isBusy, setBusy] = useState(false);
  const [problem, setProblem] = useState<string>();
  const choices = [...templates, BLANK];
  const chosen = choices.find((one) => one.id === templateId)!;

  async function make() {
    setBusy(true);
    setProblem(undefined);
    const start = templateId === BLANK.id ? { document: defaultDocument() } : { templateId };
    const result = await reach(() => createScenario({ ...start, title: title.trim() || chosen.title }));
    if (result.ok) return router.push(`/scenarios/${result.value.id}`);
    setBusy(false);
    setProblem(result.findings?.[0]?.text ?? errorText(result.code));
  }
  return (
    <Dialog isOpen size="wide" onClose={onClose} title="New scenario" description="Start from a template; every value can be changed afterwards.">
      <form
        onSubmit={(event) => {
          event.preventDefault();
          void make();
        }}
      >
        <fieldset className="border-t border-ink">
          <legend className="visually-hidden">Template</legend>
          {choices.map((one) => (
            <label key={one.id} className="grid cursor-pointer grid-cols-[22px_230px_1fr] items-baseline gap-x-2 border-b border-rule py-[7px] has-checked:bg-sheet max-[719px]:grid-cols-[26px_1fr]">
              <input type="radio" name="template" value={one.id} checked={one.id === templateId} onChange={() => setTemplateId(one.id)} className="accent-ink" />
              <span className="font-semibold">{one.id === BLANK.id ? "From scratch" : one.title}</span>
              <span className="text-ink2 max-[719px]:col-start-2">{one.purpose}</span>
            </label>
          ))}
        </fieldset>
        <div className="mt-4 max-w-[420px]">
          <TextField id="new-title" label="Name" value={title} maxLength={120} placeholder={chosen.title} onChange={(event) => setTitle(event.target.value)} problem={problem} />
        </div>
        <div className="mt-5 flex gap-3">
          <Button type="submit" kind="primary" disabled={isBusy}>
            {isBusy ? "Making…" : "Make the scenario"}
          </Button>
          <Button kind="quiet" onClick={onClose}>
            Cancel
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
