"use client";

import type { ReactNode } from "react";
import type { Notice, Severity } from "@/lib/engine/results";
import { inputAt } from "@/lib/scenario/inputs";
import { labelOf } from "@/lib/scenario/diff";
import { nameOf } from "@/lib/scenario/names";
import { formatQuantity } from "@/lib/units/format";
import { useScenario, useWorkbench } from "./provider";
import { SeverityGlyph } from "./severity-glyph";
import styles from "./notices.module.css";

const RANK: Record<Severity, number> = { fault: 0, caution: 1, note: 2 };

/** What the run and the document have to say: the finding first, why, and a link that goes there. */
export function NoticesPanel({ onGo }: { onGo?: (where: "run" | "inputs") => void }) {
  const { store, runNow } = useWorkbench();
  const findings = useScenario((state) => state.findings);
  const notices = useScenario((state) => state.shown?.simulation.notices ?? NONE);
  const run = useScenario((state) => state.run);
  const hasRun = useScenario((state) => state.shown !== null);
  const document = useScenario((state) => state.document);
  const goToField = (path: string) => {
    onGo?.("inputs");
    store.getState().wantField(path);
  };
  const goToTime = (timeS: number) => {
    onGo?.("run");
    store.getState().goTo(timeS);
  };
  const sorted = [...notices].sort((a, b) => RANK[a.severity] - RANK[b.severity]);
  return (
    <section className={styles.notices} aria-label="Notices">
      <h2 className={styles.head}>
        <span className={styles.caps}>Notices</span>
        <NoticeCount />
      </h2>
      <ul className={styles.list}>
        {run.phase === "failed" && run.problem && (
          <Item severity="fault" title={run.problem.title}>
            <p>{run.problem.text} The last good run is still shown.</p>
            <p className={styles.links}>
              <button type="button" onClick={() => runNow()}>
                Run again
              </button>
              <button type="button" onClick={() => store.getState().undo()}>
                Undo the last change
              </button>
            </p>
          </Item>
        )}
        {findings.map((finding) => (
          <Item key={`${finding.path} ${finding.code}`} severity="fault" title={labelOf(finding.path, document)}>
            <p>{finding.text} The run keeps the last values that fit together.</p>
            <p className={styles.links}>
              <button type="button" onClick={() => goToField(finding.path)}>
                Go to {fieldWords(finding.path)}
              </button>
            </p>
          </Item>
        ))}
        {sorted.map((notice) => (
          <Item
            key={`${notice.code} ${notice.path ?? ""} ${notice.timeS ?? ""}`}
            severity={notice.severity}
            title={notice.title}
          >
            <p>{notice.text}</p>
            <Links notice={notice} onTime={goToTime} onField={goToField} />
          </Item>
        ))}
        {hasRun && sorted.length === 0 && findings.length === 0 && run.phase !== "failed" && (
          <li className={styles.none}>Nothing to say about this run.</li>
        )}
      </ul>
    </section>
  );
}

const NONE: readonly Notice[] = [];
const fieldWords = (path: string): string => (inputAt(path)?.label ?? nameOf(path)).toLowerCase();

function Links({
  notice,
  onTime,
  onField,
}: {
  notice: Notice;
  onTime: (timeS: number) => void;
  onField: (path: string) => void;
}) {
  const { timeS, path } = notice;
  if (timeS === undefined && path === undefined) return null;
  return (
    <p className={styles.links}>
      {timeS !== undefined && (
        <button type="button" onClick={() => onTime(timeS)}>
          Go to {formatQuantity(timeS, "s", { digits: 6 }).text}
        </button>
      )}
      {path !== undefined && (
        <button type="button" onClick={() => onField(path)}>
          Change {fieldWords(path)}
        </button>
      )}
    </p>
  );
}

const countOf = (count: number, word: string): string => `${count} ${word}${count === 1 ? "" : "s"}`;

/** "1 fault · 2 cautions": beside the title, and on the phone's tab. */
export function NoticeCount() {
  const words = useScenario((state) => {
    const notices = state.shown?.simulation.notices ?? NONE;
    const faults =
      notices.filter((notice) => notice.severity === "fault").length +
      state.findings.length +
      (state.run.phase === "failed" ? 1 : 0);
    const cautions = notices.filter((notice) => notice.severity === "caution").length;
    return (
      [faults > 0 ? countOf(faults, "fault") : "", cautions > 0 ? countOf(cautions, "caution") : ""]
        .filter(Boolean)
        .join(" · ") || "none"
    );
  });
  return <span className={styles.count}>{words}</span>;
}

function Item({ severity, title, children }: { severity: Severity; title: string; children: ReactNode }) {
  return (
    <li className={styles.item} data-severity={severity}>
      <SeverityGlyph severity={severity} />
      <div>
        <b>{title}</b>
        {children}
      </div>
    </li>
  );
}
