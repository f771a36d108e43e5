"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { reach } from "@/components/scenario/saving";
import type { ShareLinkView } from "@/db/queries/shares";
import { errorText } from "@/lib/errors";
import { expiryIn, momentWords, readExpiry } from "./expiry";
import { ExpiryField } from "./expiry-field";
import type { ShareActions } from "./share-actions";

const STATUS_WORDS: Record<ShareLinkView["status"], string> = { open: "Open", expired: "Expired", revoked: "Revoked" };

type Props = { link: ShareLinkView; actions: Pick<ShareActions, "revokeShareLink" | "changeExpiry">; onChanged: () => void };

/** One link: what it opens, how often it was opened, when it ends; revoke and change of expiry in place. */
export function LinkRow({ link, actions, onChanged }: Props) {
  const [step, setStep] = useState<"rest" | "revoke" | "expiry">("rest");
  const [expiry, setExpiry] = useState(expiryIn("7"));
  const [problem, setProblem] = useState<string>();
  const [isBusy, setBusy] = useState(false);

  async function settle(call: () => ReturnType<typeof actions.revokeShareLink> | ReturnType<typeof actions.changeExpiry>) {
    setBusy(true);
    const result = await reach<unknown>(call);
    setBusy(false);
    if (!result.ok) return setProblem(result.findings?.[0]?.text ?? errorText(result.code));
    go("rest");
    onChanged();
  }
  function go(next: typeof step) {
    setProblem(undefined);
    setStep(next);
  }
  function changeExpiry() {
    const read = readExpiry(expiry, Date.now());
    if (!read.ok) return setProblem(read.text);
    void settle(() => actions.changeExpiry({ linkId: link.id, expiresAt: read.at }));
  }
  return (
    <li className="border-b border-rule py-2" aria-label={link.label}>
      <div className="flex flex-wrap items-baseline gap-x-4 gap-y-1">
        <span className="font-semibold">{link.label}</span>
        <span className={link.status === "open" ? "" : "text-fault"}>{STATUS_WORDS[link.status]}</span>
        <span className="text-ink2">{link.follows === "newest" ? "newest" : `rev ${link.revisionNumber}, pinned`}</span>
        <span className="text-ink2">by {link.makerName}</span>
        <span className="grow" />
        {step === "rest" && (
          <>
            {link.mayChange && (
              <Button kind="quiet" onClick={() => go("expiry")}>
                Change expiry
              </Button>
            )}
            {link.mayRevoke && (
              <Button kind="quiet" onClick={() => go("revoke")}>
                Revoke
              </Button>
            )}
          </>
        )}
      </div>
      <p className="text-ink3">
        {link.openedCount === 0 || !link.lastOpenedAt ? "Not opened yet" : `Opened ${link.openedCount === 1 ? "once" : `${link.openedCount} times`}, last ${momentWords(link.lastOpenedAt)}`}
        {" · "}
        {link.revokedAt ? `revoked ${momentWords(link.revokedAt)}` : link.expiresAt ? `${link.status === "expired" ? "ended" : "ends"} ${momentWords(link.expiresAt)}` : "no expiry"}
      </p>
      {step === "revoke" && (
        <div className="mt-2 flex flex-wrap items-center gap-3">
          <span>Whoever has this link can no longer open it. This cannot be taken back.</span>
          <Button kind="danger" autoFocus disabled={isBusy} onClick={() => void settle(() => actions.revokeShareLink({ linkId: link.id }))}>
            {isBusy ? "Revoking…" : "Revoke the link"}
          </Button>
          <Button kind="quiet" onClick={() => go("rest")}>
            Keep it
          </Button>
        </div>
      )}
      {step === "expiry" && (
        <div className="mt-2 flex flex-wrap items-end gap-3">
          <ExpiryField id={`expiry-${link.id}`} label="New end" value={expiry} onChange={setExpiry} problem={problem} />
          <Button disabled={isBusy} onClick={changeExpiry}>
            {isBusy ? "Changing…" : "Change the end"}
          </Button>
          <Button kind="quiet" onClick={() => go("rest")}>
            Cancel
          </Button>
        </div>
      )}
      {problem && step !== "expiry" && (
        <p role="alert" className="mt-1 font-medium text-fault">
          {problem}
        </p>
      )}
    </li>
  );
}
