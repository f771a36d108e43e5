"use client";

import { useState } from "react";
import { FiguresPanel } from "./figures-panel";
import { InputsPanel } from "./inputs-panel";
import { NoticesPanel } from "./notices-panel";
import { useScenario } from "./provider";
import { BridgeNow, Lanes, NoRunYet, Overview, Steps, StripNow } from "./run-region";
import { SeverityGlyph } from "./severity-glyph";
import styles from "./phone.module.css";

const TABS = ["run", "inputs", "figures", "notices"] as const;
type Tab = (typeof TABS)[number];
const WORDS: Record<Tab, string> = { run: "Run", inputs: "Inputs", figures: "Figures", notices: "Notices" };
const LANES_PX = 330;

/** One thing at a time, full height, with steps and tabs in reach of the thumb. */
export function PhoneLayout() {
  const [tab, setTab] = useState<Tab>("run");
  const shown = useScenario((state) => state.shown);
  const noticeCount = useScenario(
    (state) =>
      (state.shown?.simulation.notices.filter((notice) => notice.severity !== "note").length ?? 0) +
      state.findings.length,
  );
  return (
    <div className={styles.phone}>
      <section className={styles.sheet} data-region={tab} tabIndex={-1} aria-label={WORDS[tab]}>
        {tab === "run" && (shown ? <RunSheet onNotices={() => setTab("notices")} /> : <NoRunYet />)}
        {tab === "inputs" && <InputsPanel />}
        {tab === "figures" && <FiguresPanel />}
        {tab === "notices" && <NoticesPanel onGo={(where) => setTab(where)} />}
      </section>
      <footer className={styles.bar}>
        {tab === "run" && shown && <Steps shown={shown} isPhone />}
        <nav className={styles.tabs} aria-label="Parts of the scenario">
          {TABS.map((one) => (
            <button key={one} type="button" aria-current={tab === one ? "page" : undefined} onClick={() => setTab(one)}>
              {WORDS[one]}
              {one === "notices" && noticeCount > 0 ? ` ${noticeCount}` : ""}
            </button>
          ))}
        </nav>
      </footer>
    </div>
  );
}

function RunSheet({ onNotices }: { onNotices: () => void }) {
  const shown = useScenario((state) => state.shown);
  const worst = useScenario((state) => state.shown?.simulation.notices[0]);
  if (!shown) return null;
  return (
    <div className={styles.run}>
      <BridgeNow shown={shown} isPhone />
      <StripNow shown={shown} />
      {worst && (
        <button type="button" className={styles.worst} onClick={onNotices}>
          <SeverityGlyph severity={worst.severity} />
          <b>{worst.title}</b>
          <span>why ›</span>
        </button>
      )}
      <Overview shown={shown} />
      <Lanes shown={shown} heightPx={LANES_PX} />
    </div>
  );
}
