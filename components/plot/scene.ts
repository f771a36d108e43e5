import type { View } from "@/lib/engine/results";
import { bandsIn, LEAST_BAND_PX } from "./bands";
import { timeScaleOf, type PlotLayout } from "./layout";
import type { PlotWindow, TimeScale } from "./scale";
import type { SensingFacts } from "./sensing-facts";
import { signRuns, type SignRun } from "./sign-runs";

/** All that the static layer is drawn from. */
export type Scene = {
  layout: PlotLayout;
  window: PlotWindow;
  scale: TimeScale;
  view: View;
  facts: SensingFacts;
  runs: SignRun[];
  /** Bands too narrow to tell apart: the strip shows shares and the lanes stay blank. */
  isDense: boolean;
};

export function buildScene(view: View, facts: SensingFacts, layout: PlotLayout, range: PlotWindow): Scene {
  const visible = bandsIn(view.bands, range).length;
  const plotPx = layout.x1 - layout.x0;
  return {
    layout,
    window: range,
    scale: timeScaleOf(layout, range),
    view,
    facts,
    runs: signRuns(view),
    isDense: visible > 0 && plotPx / visible < LEAST_BAND_PX,
  };
}
