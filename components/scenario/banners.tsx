"use client";

import { diffDocuments } from "@/lib/scenario/diff";
import { useScenario, useWorkbench } from "./provider";
import { formatMoment } from "./saved-words";
import { keepMine } from "./saving";
import { useDuplicate } from "./use-duplicate";
import { useNow } from "./use-now";
import type { Opened } from "./workbench-dialogs";
import styles from "./workbench.module.css";

/** One line each under the sub-head: what came back from a closed tab, whose revision came first, what this role may do. */
type Props = { onOpen: (dialog: Opened) => void; mayDuplicate: boolean; isArchived: boolean };

export function Banners({ onOpen, mayDuplicate, isArchived }: Props) {
  return (
    <>
      <RestoredBanner />
      <ConflictBanner onOpen={onOpen} />
      <RoleBanner mayDuplicate={mayDuplicate} isArchived={isArchived} />
    </>
  );
}

function RestoredBanner() {
  const { store } = useWorkbench();
  const restored = useScenario((state) => state.save.restored);
  const base = useScenario((state) => state.base);
  const newest = useScenario((state) => state.newest);
  const nowMs = useNow();
  if (!restored) return null;
  const count = diffDocuments(base.document, restored.document).length;
  return (
    <p className={styles.banner} role="status">
      <span>
        <b>{count === 1 ? "1 change" : `${count} changes`} of yours came back.</b> Not saved; kept in this browser since{" "}
        {formatMoment(restored.keptAtMs, nowMs ?? restored.keptAtMs)}.
        {base.number < newest.number &&
          ` They were made on rev ${base.number}; rev ${newest.number} has been saved since.`}
      </span>
      <button type="button" className="button" onClick={() => store.getState().acceptRestored()}>
        Keep them
      </button>
      <button type="button" className="button" data-kind="quiet" onClick={() => store.getState().discardRestored()}>
        Discard, show rev {newest.number}
      </button>
    </p>
  );
}

function ConflictBanner({ onOpen }: { onOpen: (dialog: Opened) => void }) {
  const { store, actions } = useWorkbench();
  const conflict = useScenario((state) => state.save.conflict);
  const base = useScenario((state) => state.base);
  const document = useScenario((state) => state.document);
  if (!conflict) return null;
  const { newest } = conflict;
  const words = (changes: { label: string }[]) =>
    changes
      .slice(0, 2)
      .map((one) => one.label.toLowerCase())
      .join(" and ") + (changes.length > 2 ? ` and ${changes.length - 2} more` : "");
  const mine = diffDocuments(base.document, document);
  const theirs = diffDocuments(base.document, newest.document);
  return (
    <p className={styles.banner} data-tone="caution" role="alert">
      <span>
        <b>
          {newest.authorName} saved rev {newest.number} while you were editing rev {base.number}.
        </b>{" "}
        You changed {words(mine) || "nothing"}; rev {newest.number} changed {words(theirs) || "nothing"}. Both are kept.
      </span>
      <button type="button" className="button" onClick={() => onOpen("conflict")}>
        Compare
      </button>
      <button type="button" className="button" onClick={() => void keepMine(store, actions)}>
        Keep mine as rev {newest.number + 1}
      </button>
    </p>
  );
}

function RoleBanner({ mayDuplicate, isArchived }: Omit<Props, "onOpen">) {
  const duplicate = useDuplicate();
  const mode = useScenario((state) => state.mode);
  // a guest is told by the page that the link opens, the front page keeps quiet
  if (mode !== "read") return null;
  return (
    <p className={styles.banner}>
      <span>
        {isArchived
          ? "This scenario is archived: restore it in the list to save changes."
          : "Play with any value; saving here is not part of your role."}
        {mayDuplicate && " A copy of your own can be saved."}
      </span>
      <button type="button" className="button" disabled={!mayDuplicate} onClick={() => void duplicate()}>
        Duplicate with my changes
      </button>
    </p>
  );
}
