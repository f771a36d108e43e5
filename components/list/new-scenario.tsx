"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { TextField } from "@/components/ui/text-field";
import { errorText } from "@/lib/errors";
import type { ListActions } from "./list-actions";

export type TemplateChoice = { id: string; title: string; purpose: string; tags: string[] };

type Props = { templates: TemplateChoice[]; createScenario: ListActions["createScenario"]; onClose: () => void };

/** Starts a scenario from one of the templates, under a name of one's own. */
export function NewScenario({ templates, createScenario, onClose }: Props) {
  const router = useRouter();
  const [templateId, setTemplateId] = useState(templates[0]!.id);
  const [title, setTitle] = useState("");
  const [isBusy, setBusy] = useState(false);
  const [problem, setProblem] = useState<string>();
  const chosen = templates.find((one) => one.id === templateId)!;

  async function make() {
    setBusy(true);
    const result = await createScenario({ templateId, title: title.trim() || chosen.title });
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
          {templates.map((one) => (
            <label key={one.id} className="grid cursor-pointer grid-cols-[22px_230px_1fr] items-baseline gap-x-2 border-b border-rule py-[7px] has-checked:bg-sheet max-[719px]:grid-cols-[26px_1fr]">
              <input type="radio" name="template" value={one.id} checked={one.id === templateId} onChange={() => setTemplateId(one.id)} className="accent-ink" />
              <span className="font-semibold">{one.title}</span>
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
