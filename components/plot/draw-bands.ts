import type { Band } from "@/lib/engine/results";
import { bandsIn, bandShares, LANE_PAINT, mergeBands, STRIP_PAINT } from "./bands";
import type { PlacedLane } from "./layout";
import { crisp, type Painter } from "./painter";
import { timeOf, xOf } from "./scale";
import type { Scene } from "./scene";

/** Width of a column of shares when single bands are too narrow. */
const SHARE_COLUMN_PX = 6;
const LEAST_MARK_PX = 1.5;

/** Light tints of the conduction bands behind all plot lanes, with a one-pixel edge where current returns to the supply. */
export function drawLaneBands(painter: Painter, scene: Scene): void {
  const { layout, scale } = scene;
  const first = layout.lanes.find((lane) => lane.kind === "signed" || lane.kind === "lines");
  if (first === undefined || scene.isDense) return;
  const top = first.y - 4;
  const height = layout.lanesBottom - top - 2;
  for (const band of mergeBands(bandsIn(scene.view.bands, scene.window))) {
    const paint = LANE_PAINT[band.conduction];
    if (paint === null) continue;
    const x = Math.round(xOf(scale, band.fromS));
    const end = Math.max(x + 1, Math.round(xOf(scale, band.toS)));
    painter.rect(x, top, end - x, height, paint);
    if (band.conduction !== "returnToSupply" || end - x < 4) continue;
    for (const edge of [x + 0.5, end - 0.5]) painter.polyline([edge, top, edge, top + height], { color: "edge", width: 1, opacity: 0.35 });
  }
}

export function drawStrip(painter: Painter, scene: Scene, lane: PlacedLane): void {
  const { layout } = scene;
  const bands = bandsIn(scene.view.bands, scene.window);
  if (bands.length === 0) {
    const note = scene.view.kind === "envelope" ? "zoom in to see single periods" : "";
    painter.text((layout.x0 + layout.x1) / 2, lane.y + lane.height - 4, note, { size: 11, color: "ink3", anchor: "middle" });
  } else if (scene.isDense) drawShares(painter, scene, lane, bands);
  else drawSingleBands(painter, scene, lane, bands);
  for (const y of [lane.y - 0.5, lane.y + lane.height + 0.5]) painter.polyline([layout.x0, crisp(y), layout.x1, crisp(y)], { color: "ink", width: 1 });
}

/** Dead times first as long as they are wide, then never narrower than 1.5 px: a hairline would vanish at this zoom. */
function drawSingleBands(painter: Painter, scene: Scene, lane: PlacedLane, bands: readonly Band[]): void {
  const merged = mergeBands(bands);
  const isShort = (conduction: string) => conduction === "deadTime" || conduction === "shootThrough";
  for (const pass of [false, true]) {
    for (const band of merged) {
      const paint = STRIP_PAINT[band.conduction];
      if (paint === null || isShort(band.conduction) !== pass) continue;
      const x = xOf(scene.scale, band.fromS);
      const width = xOf(scene.scale, band.toS) - x;
      const drawn = pass ? Math.max(LEAST_MARK_PX, width) : width;
      painter.rect(x - (drawn - width) / 2, lane.y, drawn, lane.height, paint);
      if (width > 5) painter.polyline([crisp(x), lane.y, crisp(x), lane.y + lane.height, NaN, NaN, crisp(x + width), lane.y, crisp(x + width), lane.y + lane.height], { color: "ink", width: 1 });
    }
  }
}

function drawShares(painter: Painter, scene: Scene, lane: PlacedLane, bands: readonly Band[]): void {
  const { scale } = scene;
  let next = 0;
  for (let x = scale.x0; x < scale.x1; x += SHARE_COLUMN_PX) {
    const width = Math.min(SHARE_COLUMN_PX, scale.x1 - x);
    const fromS = timeOf(scale, x);
    const toS = timeOf(scale, x + width);
    while (next < bands.length && bands[next]!.toS <= fromS) next += 1;
    let end = next;
    while (end < bands.length && bands[end]!.fromS < toS) end += 1;
    for (const share of bandShares(bands.slice(next, end), fromS, toS)) {
      const paint = STRIP_PAINT[share.conduction];
      if (paint !== null) painter.rect(x, lane.y + share.from * lane.height, width, (share.to - share.from) * lane.height, paint);
    }
  }
}

const GATES = [
  { key: "highA", label: "AH", opacity: 0.88 },
  { key: "lowA", label: "AL", opacity: 0.88 },
  { key: "highB", label: "BH", opacity: 0.6 },
  { key: "lowB", label: "BL", opacity: 0.6 },
] as const;

/** One row a switch; a bar while it is on, as tall as its share of the time where single bands are too narrow. */
export function drawGates(painter: Painter, scene: Scene, lane: PlacedLane): void {
  const { layout, scale } = scene;
  const rowPx = lane.height / GATES.length;
  const bands = bandsIn(scene.view.bands, scene.window);
  GATES.forEach((gate, row) => {
    const y = lane.y + row * rowPx;
    const bottom = crisp(y + rowPx - 1.5);
    painter.polyline([layout.x0, bottom, layout.x1, bottom], { color: "rule", width: 1 });
    const paint = { color: "ink" as const, opacity: gate.opacity };
    if (scene.isDense) {
      for (const column of onShares(scene, bands, gate.key)) {
        const height = (rowPx - 3) * column.share;
        painter.rect(column.x, bottom - height, column.width, height, paint);
      }
    } else
      for (const stretch of onStretches(bands, gate.key)) {
        const x = xOf(scale, stretch.fromS);
        painter.rect(x, y + 1.5, Math.max(0.8, xOf(scale, stretch.toS) - x), rowPx - 4, paint);
      }
    painter.text(layout.x0 - 7, y + rowPx - 1.5, gate.label, { size: 10.5, color: "ink3", anchor: "end" });
  });
}

type GateKey = (typeof GATES)[number]["key"];

/** Neighbouring bands in which a switch stays on, as one stretch. */
export function onStretches(bands: readonly Band[], key: GateKey): { fromS: number; toS: number }[] {
  const stretches: { fromS: number; toS: number }[] = [];
  bands.forEach((band, index) => {
    if (!band.gates[key]) return;
    const last = stretches[stretches.length - 1];
    if (last !== undefined && bands[index - 1]?.gates[key]) last.toS = band.toS;
    else stretches.push({ fromS: band.fromS, toS: band.toS });
  });
  return stretches;
}

function onShares(scene: Scene, bands: readonly Band[], key: GateKey): { x: number; width: number; share: number }[] {
  const { scale } = scene;
  const columns: { x: number; width: number; share: number }[] = [];
  const stretches = onStretches(bands, key);
  let next = 0;
  for (let x = scale.x0; x < scale.x1; x += SHARE_COLUMN_PX) {
    const width = Math.min(SHARE_COLUMN_PX, scale.x1 - x);
    const fromS = timeOf(scale, x);
    const toS = timeOf(scale, x + width);
    let onS = 0;
    while (next < stretches.length && stretches[next]!.toS <= fromS) next += 1;
    for (let index = next; index < stretches.length && stretches[index]!.fromS < toS; index += 1) {
      onS += Math.min(stretches[index]!.toS, toS) - Math.max(stretches[index]!.fromS, fromS);
    }
    columns.push({ x, width, share: onS / (toS - fromS) });
  }
  return columns;
}
