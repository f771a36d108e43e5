"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { TextField } from "@/components/ui/text-field";
import { reach } from "@/components/scenario/saving";
import { errorText } from "@/lib/errors";
import { readExpiry, type Expiry } from "./expiry";
import { ExpiryField } from "./expiry-field";
import type { ShareActions } from "./share-actions";

export type LinkDraft = { label: string; follows: "pinned" | "newest"; expiry: Expiry };
type Props = {
  scenarioId: string;
  revisionNumber: number;
  draft: LinkDraft;
  onDraft: (draft: LinkDraft) => void;
  createShareLink: ShareActions["createShareLink"];
  onMade: (made: { label: string; url: string }) => void;
};
type Problems = { label?: string; follows?: string; expiry?: string; form?: string };

/** Makes a link: what it is for, what it opens, how long. A refusal stands at its field and what was typed stays. */
export function MakeLink({ scenarioId, revisionNumber, draft, onDraft, createShareLink, onMade }: Props) {
  const [problems, setProblems] = useState<Problems>({});
  const [isBusy, setBusy] = useState(false);

  async function make() {
    const label = draft.label.trim();
    const expiry = readExpiry(draft.expiry, Date.now());
    if (!label || !expiry.ok) return setProblems({ label: label ? undefined : "Say who or what the link is for.", expiry: expiry.ok ? undefined : expiry.text });
    setBusy(true);
    setProblems({});
    const pin = draft.follows === "pinned" ? { revisionNumber } : {};
    const result = await reach(() => createShareLink({ scenarioId, label, follows: draft.follows, ...pin, expiresAt: expiry.at }));
    setBusy(false);
    if (result.ok) return onMade({ label, url: result.value.url });
    const at = (path: string) => result.findings?.find((finding) => finding.path === path)?.text;
    const found = { label: at("label"), follows: at("revisionNumber") ?? at("follows"), expiry: at("expiresAt") };
    setProblems(Object.values(found).some(Boolean) ? found : { form: errorText(result.code) });
  }
  const follow = (follows: LinkDraft["follows"], words: string) => (
    <label className="flex cursor-pointer items-center gap-2 py-1">
      <input type="radio" name="share-follows" className="accent-ink" checked={draft.follows === follows} onChange={() => onDraft({ ...draft, follows })} />
      {words}
    </label>
  );
  return (
    <form
      noValidate
      className="grid grid-cols-[1fr_auto_auto] items-start gap-x-5 gap-y-3 border-t border-ink pt-4 max-[719px]:grid-cols-1"
      onSubmit={(event) => {
        event.preventDefault();
        void make();
      }}
    >
      <TextField id="share-label" label="Label" hint="Who or what it is for. The person who opens it sees it." maxLength={80} value={draft.label} onChange={(event) => onDraft({ ...draft, label: event.target.value })} problem={problems.label} />
      <fieldset>
        <legend className="font-medium">Opens</legend>
        {follow("pinned", `Revision ${revisionNumber}, pinned`)}
        {follow("newest", "Always the newest revision")}
        {problems.follows && (
          <p role="alert" className="font-medium text-fault">
            {problems.follows}
          </p>
        )}
      </fieldset>
      <ExpiryField id="share-expiry" label="Ends" value={draft.expiry} onChange={(expiry) => onDraft({ ...draft, expiry })} problem={problems.expiry} />
      <div className="col-span-full flex flex-wrap items-center gap-4">
        <Button type="submit" kind="primary" disabled={isBusy}>
          {isBusy ? "Making…" : "Make the link"}
        </Button>
        {problems.form && (
          <p role="alert" className="font-medium text-fault">
            {problems.form}
          </p>
        )}
      </div>
    </form>
  );
}
