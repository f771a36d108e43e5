"use client";

import { useMemo, useRef } from "react";
import { Bridge } from "@/components/bridge/bridge";
import { ReadingStrip } from "@/components/bridge/reading-strip";
import { bandAt } from "@/components/plot/bands";
import { EventsTable } from "@/components/plot/events";
import type { LaneId } from "@/components/plot/lanes";
import { RunOverview } from "@/components/plot/overview";
import { RunPlot } from "@/components/plot/run-plot";
import { StepBar } from "@/components/plot/step-bar";
import { extentOf, valueAt } from "@/components/plot/values";
import type { ShownRun } from "./scenario-state";
import { useScenario, useWorkbench } from "./provider";
import { useThemeName } from "./use-theme-name";
import styles from "./run.module.css";

/** The run: step bar and overview, bridge and events, lanes. Each part follows the cursor by itself, so nothing else is drawn again. */
export function RunRegion() {
  const shown = useScenario((state) => state.shown);
  const region = useRef<HTMLDivElement>(null);
  if (!shown) return <NoRunYet />;
  return (
    <div ref={region} className={styles.run}>
      <div className={styles.steps}>
        <Steps shown={shown} />
        <div className={styles.overview}>
          <Overview shown={shown} />
        </div>
      </div>
      <div className={styles.diagram}>
        <BridgeNow shown={shown} />
        <div className={styles.events}>
          <Events shown={shown} />
        </div>
      </div>
      <div className={styles.lanes}>
        <Lanes
          shown={shown}
          onTogglePlay={() => region.current?.querySelector<HTMLButtonElement>(PLAY_BUTTON)?.click()}
        />
      </div>
    </div>
  );
}

/** Space on the lanes presses the step bar's own button, which keeps the time of playing. */
const PLAY_BUTTON = '[aria-label="Step through the run"] button[aria-pressed]';

export function NoRunYet() {
  const phase = useScenario((state) => state.run.phase);
  return (
    <div className={styles.empty}>
      <p className={styles.serif}>
        {phase === "failed"
          ? "There is no run to show."
          : phase === "stale"
            ? "The run was cancelled."
            : "The first run is on its way."}
      </p>
    </div>
  );
}

type Part = { shown: ShownRun };

export function Steps({ shown, isPhone = false }: Part & { isPhone?: boolean }) {
  const { store } = useWorkbench();
  const cursorS = useScenario((state) => state.cursorS);
  return (
    <StepBar
      view={shown.view}
      simulation={shown.simulation}
      document={shown.document}
      cursorS={cursorS}
      onCursor={(timeS) => store.getState().goTo(timeS)}
      isPhone={isPhone}
    />
  );
}

export function Overview({ shown }: Part) {
  const { store } = useWorkbench();
  const cursorS = useScenario((state) => state.cursorS);
  const viewWindow = useScenario((state) => state.viewWindow);
  const theme = useThemeName();
  return (
    <RunOverview
      overview={shown.overview}
      simulation={shown.simulation}
      document={shown.document}
      cursorS={cursorS}
      onCursor={(timeS) => store.getState().goTo(timeS)}
      viewWindow={viewWindow}
      onViewWindow={(next) => store.getState().setViewWindow(next)}
      theme={theme}
    />
  );
}

function Events({ shown }: Part) {
  const { store } = useWorkbench();
  const cursorS = useScenario((state) => state.cursorS);
  return (
    <EventsTable
      view={shown.view}
      overview={shown.overview}
      simulation={shown.simulation}
      document={shown.document}
      cursorS={cursorS}
      onCursor={(timeS) => store.getState().goTo(timeS)}
    />
  );
}

/** The largest current of the run: the widest ribbon. */
function useFullScale(shown: ShownRun): number {
  return useMemo(() => {
    const extent = extentOf(shown.overview, "motorCurrentA");
    return Math.max(Math.abs(extent?.min ?? 0), Math.abs(extent?.max ?? 0), 1e-3);
  }, [shown.overview]);
}

export function BridgeNow({ shown, isPhone = false }: Part & { isPhone?: boolean }) {
  const reading = useScenario((state) => state.reading);
  const isStale = useIsStale();
  const fullScaleA = useFullScale(shown);
  if (!reading) return <div className={styles.bridge} />;
  const idealV = valueAt(shown.view, "idealV", reading.timeS);
  return (
    <div className={styles.bridge}>
      <Bridge
        reading={reading}
        band={bandAt(shown.view.bands, reading.timeS)}
        document={shown.document}
        fullScaleA={fullScaleA}
        idealV={idealV}
        isPhone={isPhone}
        isStale={isStale}
      />
    </div>
  );
}

export function StripNow({ shown }: Part) {
  const reading = useScenario((state) => state.reading);
  if (!reading) return null;
  return (
    <ReadingStrip reading={reading} document={shown.document} idealV={valueAt(shown.view, "idealV", reading.timeS)} />
  );
}

/** The last run fades when a newer one takes long, failed or was cancelled. */
function useIsStale(): boolean {
  return useScenario(
    (state) =>
      (state.run.phase === "recomputing" && state.run.isSlow) ||
      state.run.phase === "failed" ||
      state.run.phase === "stale",
  );
}

type LanesProps = Part & { lanes?: readonly LaneId[]; heightPx?: number; onTogglePlay?: () => void };

export function Lanes({ shown, lanes, heightPx, onTogglePlay }: LanesProps) {
  const { store } = useWorkbench();
  const cursorS = useScenario((state) => state.cursorS);
  const viewWindow = useScenario((state) => state.viewWindow);
  const pinS = useScenario((state) => state.pinS);
  const reading = useScenario((state) => state.reading);
  const areLettersOn = useScenario((state) => state.areLettersOn);
  const isHeld = useScenario((state) => state.gesture !== null);
  const act = store.getState;
  return (
    <RunPlot
      view={shown.view}
      overview={shown.overview}
      simulation={shown.simulation}
      document={shown.document}
      reading={reading}
      cursorS={cursorS}
      onCursor={(timeS) => act().setCursor(timeS)}
      viewWindow={viewWindow}
      onViewWindow={(next) => act().setViewWindow(next)}
      pinS={pinS}
      onPin={(timeS) => act().setPin(timeS)}
      theme={useThemeName()}
      areLettersOn={areLettersOn}
      isHeld={isHeld}
      isStale={useIsStale()}
      lanes={lanes}
      heightPx={heightPx}
      onTogglePlay={onTogglePlay}
    />
  );
}
