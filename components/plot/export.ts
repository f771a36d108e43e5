import type { View } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { drawLaneNames, drawScene } from "./draw-scene";
import { availableLanes, defaultLaneIds, type LaneId } from "./lanes";
import { laneDomains, layoutLanes } from "./layout";
import type { PlotWindow } from "./scale";
import { buildScene } from "./scene";
import { readSensing } from "./sensing-facts";
import { svgPainter } from "./svg-painter";
import { THEMES, type ThemeColors, type ThemeName } from "./theme";
import type { Size } from "./use-size";

export type ExportOptions = {
  window?: PlotWindow;
  laneIds?: readonly LaneId[];
  /** The whole run, so that an exported window has the value scales of the page. */
  overview?: View;
  /** Title and description of the picture. */
  title?: string;
  /** Distinguishes drawings on one page; a hash of the content serves otherwise. */
  idPrefix?: string;
};

const MARGIN_PX = 12;

/** The plot as one self-contained SVG by the same drawing rules as the screen: vector patterns, unique ids, no font file needed. */
export function plotToSvg(view: View, document: ScenarioDocument, size: Size, theme: ThemeName | ThemeColors, options: ExportOptions = {}): string {
  const colors = typeof theme === "string" ? THEMES[theme] : theme;
  const facts = readSensing(document);
  const wanted = options.laneIds ?? defaultLaneIds(facts, false);
  const lanes = availableLanes(facts, view).filter((lane) => wanted.includes(lane.id));
  const domains = laneDomains(lanes, [view, options.overview], facts, undefined, false);
  const layout = layoutLanes(lanes, domains, size.width - 2 * MARGIN_PX + NO_READOUT_PX, size.height - 2 * MARGIN_PX, false);
  const scene = buildScene(view, facts, layout, options.window ?? { fromS: view.fromS, toS: view.toS });
  const painter = svgPainter(colors, options.idPrefix ?? `plot-${hashOf(view)}`);
  drawScene(painter, scene);
  drawLaneNames(painter, scene);
  const { defs, body } = painter.markup();
  const height = layout.height + 2 * MARGIN_PX;
  const title = (options.title ?? "Waveforms of the run").replace(/&/g, "&amp;").replace(/</g, "&lt;");
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" width="${size.width}" height="${height}" viewBox="0 0 ${size.width} ${height}" role="img" aria-label="${title.replace(/"/g, "&quot;")}">` +
    `<title>${title}</title><defs>${defs}</defs><rect width="${size.width}" height="${height}" fill="${colors.paper}"/>` +
    `<g transform="translate(${MARGIN_PX} ${MARGIN_PX})">\n${body}\n</g></svg>`
  );
}

/** An export has no cursor, so the column of readings is not kept free, save for the ticks of the difference. */
const NO_READOUT_PX = 114;

/** A short hash (FNV-1a, 32 bit) of the view's extent and point count: equal pictures get equal ids, different ones almost never. */
function hashOf(view: View): string {
  let hash = 0x811c9dc5;
  for (const character of `${view.fromS}|${view.toS}|${view.timeS.length}|${view.samples.length}|${view.traces.motorCurrentA?.max[0] ?? 0}`) {
    hash = Math.imul(hash ^ character.charCodeAt(0), 0x01000193) >>> 0;
  }
  return hash.toString(36);
}

/** Draws an SVG on a canvas and gives it as PNG; `scale` device pixels per CSS pixel. Browser only. */
export async function svgToPng(svg: string, scale: number): Promise<Blob> {
  const image = new Image();
  const url = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}`;
  await new Promise<void>((resolve, reject) => {
    image.onload = () => resolve();
    image.onerror = () => reject(new Error("the picture could not be read"));
    image.src = url;
  });
  const canvas = window.document.createElement("canvas");
  canvas.width = Math.round(image.naturalWidth * scale);
  canvas.height = Math.round(image.naturalHeight * scale);
  const context = canvas.getContext("2d");
  if (context === null) throw new Error("this browser gives no 2D canvas");
  context.drawImage(image, 0, 0, canvas.width, canvas.height);
  return new Promise((resolve, reject) => canvas.toBlob((blob) => (blob === null ? reject(new Error("the picture could not be written")) : resolve(blob)), "image/png"));
}
