import type { View } from "@/lib/engine/results";
import { drawBaseLine, drawSigned } from "./draw-lanes";
import { allLanes } from "./lanes";
import type { PlotLayout } from "./layout";
import type { Painter } from "./painter";
import { buildScene, type Scene } from "./scene";
import type { SensingFacts } from "./sensing-facts";
import { paddedDomain } from "./ticks";
import { extentOf } from "./values";

/** The whole run's motor current as one small lane, by the same rules as the plot. */
export function overviewScene(overview: View, facts: SensingFacts, width: number, height: number, top: number): Scene {
  const lane = allLanes(facts).find((other) => other.id === "motor")!;
  const extent = extentOf(overview, "motorCurrentA") ?? { min: 0, max: 0 };
  const domain = paddedDomain(extent.min, extent.max, 0, 1e-3);
  const laneHeight = height - top - 2;
  const layout: PlotLayout = {
    width,
    height,
    isCompact: true,
    x0: 6,
    x1: width - 6,
    lanesTop: top,
    lanesBottom: height,
    borderY: height,
    axisY: height,
    lanes: [{ ...lane, y: top, height: laneHeight, scale: { ...domain, y0: top, y1: top + laneHeight } }],
  };
  return buildScene(overview, facts, layout, { fromS: overview.fromS, toS: overview.toS });
}

export function drawOverview(painter: Painter, scene: Scene): void {
  const lane = scene.layout.lanes[0];
  if (lane === undefined) return;
  drawSigned(painter, scene, lane);
  drawBaseLine(painter, scene, lane);
}
