"use client";

import { useCallback, useEffect, useState } from "react";
import { Button } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { reach } from "@/components/scenario/saving";
import type { ShareLinkView } from "@/db/queries/shares";
import { errorText } from "@/lib/errors";
import { LinkRow } from "./link-row";
import { MadeLink } from "./made-link";
import { MakeLink, type LinkDraft } from "./make-link";
import type { ShareActions } from "./share-actions";

type Props = { scenarioId: string; revisionNumber: number; hasUnsaved?: boolean; draft: LinkDraft; onDraft: (draft: LinkDraft) => void; actions: ShareActions; onClose: () => void };

/** Makes links to a scenario and keeps watch over those that exist. */
export function ShareDialog({ scenarioId, revisionNumber, hasUnsaved = false, draft, onDraft, actions, onClose }: Props) {
  const [links, setLinks] = useState<ShareLinkView[] | null>(null);
  const [problem, setProblem] = useState<string>();
  const [made, setMade] = useState<{ label: string; url: string }>();
  const { listShareLinks } = actions;

  const load = useCallback(async () => {
    const result = await reach(() => listShareLinks({ scenarioId }));
    if (result.ok) setLinks(result.value);
    setProblem(result.ok ? undefined : errorText(result.code));
  }, [listShareLinks, scenarioId]);
  useEffect(() => {
    // the answer comes later, so nothing is set while the effect runs
    // eslint-disable-next-line react-hooks/set-state-in-effect
    void load();
  }, [load]);

  return (
    <Dialog isOpen size="wide" onClose={onClose} title="Share" description="Whoever has a link sees this scenario and can play with its values, without an account. They change nothing here.">
      {hasUnsaved && <p className="mb-3 text-caution">A link opens saved revisions only: your unsaved changes are not in it.</p>}
      <MakeLink
        scenarioId={scenarioId}
        revisionNumber={revisionNumber}
        draft={draft}
        onDraft={onDraft}
        createShareLink={actions.createShareLink}
        onMade={(one) => {
          setMade(one);
          onDraft({ ...draft, label: "" });
          void load();
        }}
      />
      {made && <MadeLink key={made.url} {...made} />}
      <h3 className="caps mt-6 border-b border-ink pb-1">Links of this scenario</h3>
      {problem && (
        <p role="alert" className="flex items-center gap-3 py-2 font-medium text-fault">
          {problem}
          <Button onClick={() => void load()}>Load the links again</Button>
        </p>
      )}
      {links === null ? (
        !problem && (
          <p role="status" className="py-2 text-ink3">
            Loading the links
          </p>
        )
      ) : links.length === 0 ? (
        <p className="py-2 font-serif text-[16px]/[24px] text-ink2">No link has been made yet.</p>
      ) : (
        <ul>
          {links.map((link) => (
            <LinkRow key={link.id} link={link} actions={actions} onChanged={() => void load()} />
          ))}
        </ul>
      )}
    </Dialog>
  );
}
