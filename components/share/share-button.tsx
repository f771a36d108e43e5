"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { isDirty } from "@/components/scenario/checked-document";
import { useScenario } from "@/components/scenario/provider";
import { expiryIn } from "./expiry";
import type { LinkDraft } from "./make-link";
import type { ShareActions } from "./share-actions";
import { ShareDialog } from "./share-dialog";

const NOT_YOURS = "Your role in this workspace does not share scenarios.";

type Props = { scenarioId: string; mayShare: boolean; actions: ShareActions };

/** Opens the links of the scenario on the page; what was typed stays when the dialog is closed before a link is made. */
export function ShareButton({ scenarioId, mayShare, actions }: Props) {
  const base = useScenario((state) => state.base);
  const hasUnsaved = useScenario(isDirty);
  const [isOpen, setOpen] = useState(false);
  const [draft, setDraft] = useState<LinkDraft>({ label: "", follows: "pinned", expiry: expiryIn("30") });
  return (
    <>
      <Button disabledReason={mayShare ? undefined : NOT_YOURS} aria-haspopup="dialog" onClick={() => setOpen(true)}>
        Share
      </Button>
      {isOpen && <ShareDialog scenarioId={scenarioId} revisionNumber={base.number} hasUnsaved={hasUnsaved} draft={draft} onDraft={setDraft} actions={actions} onClose={() => setOpen(false)} />}
    </>
  );
}
