"use client";

import { useMemo } from "react";
import type { RunPlotProps } from "./run-plot";
import { cursorFacts } from "./cursor-facts";
import { eventRows, mergeEvents } from "./event-rows";
import { runStops } from "./run-stops";
import { knownSamples } from "./sample-schedule";
import type { SensingFacts } from "./sensing-facts";

/** Stops of the steps, rows of the table and what is known at the cursor; only the last changes with the cursor. */
export function useRunData(props: RunPlotProps, sensing: SensingFacts) {
  const { view, overview, simulation, reading, cursorS, pinS } = props;
  const stops = useMemo(() => runStops(simulation, view, sensing), [simulation, view, sensing]);
  const samples = useMemo(() => knownSamples(simulation.samples, view.samples, sensing.instantS), [simulation, view, sensing]);
  const rows = useMemo(() => eventRows(mergeEvents(simulation.events, view.events), samples, view.bands, sensing), [simulation, view, samples, sensing]);
  const facts = useMemo(
    () => cursorFacts({ view, overview, reading, samples, cursorS, pinS, sensing }),
    [view, overview, reading, samples, cursorS, pinS, sensing],
  );
  return { stops, rows, facts };
}
