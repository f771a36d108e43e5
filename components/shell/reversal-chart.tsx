import { scaleLinear } from "d3-scale";
import type { ReversalChartData } from "@/lib/explain/reversal-chart";
import { BOX } from "./chart-box";
import { levelLines, ringsAbove, thinned, valueAt, type Field, type Point } from "./contours";
import { ChartFrame } from "./reversal-chart-frame";
import { ChartWords, isNearWord, placeWords } from "./reversal-chart-words";

const STEP_A = 0.5;
/** Distance of the figures strewn over the chart, and how far each stands from its place in the grid. */
const FIGURES = { dx: 76, dy: 62, jitter: 15 } as const;
const THIN_PX = 0.35;

const SCALES = {
  x: (columnCount: number) => scaleLinear([0, columnCount - 1], [BOX.left, BOX.width - BOX.right]),
  y: (rowCount: number) => scaleLinear([0, rowCount - 1], [BOX.height - BOX.bottom, BOX.top]),
};
type Level = { level: number; area: string; line: string };

// the data never changes while the server runs, and tracing its lines takes longer than sending them
const traced = new WeakMap<ReversalChartData, Level[]>();

function levelsOf(chart: ReversalChartData): Level[] {
  const known = traced.get(chart);
  if (known) return known;
  const { timeS, duty, currentA } = chart;
  const [x, y] = [SCALES.x(timeS.length), SCALES.y(duty.length)];
  const toPage = ([column, row]: Point): Point => [x(column), y(row)];
  const all = currentA.flat();
  const from = Math.ceil(Math.min(...all) / STEP_A);
  const to = Math.floor(Math.max(...all) / STEP_A);
  const levels = Array.from({ length: to - from + 1 }, (_, n) => (from + n) * STEP_A).map((level) => {
    // below slack it is the far side that is filled
    const rings = level < 0 ? ringsAbove(negated(currentA), -level) : ringsAbove(currentA, level);
    const area = isWhole(level) && level !== 0 ? pathOf(rings.map((ring) => ring.points.map(toPage)), "Z") : "";
    return { level, area, line: pathOf(levelLines(rings).map((part) => part.map(toPage)), "") };
  });
  traced.set(chart, levels);
  return levels;
}

const isWhole = (level: number) => Number.isInteger(level);
const negated = (field: Field): Field => field.map((row) => row.map((value) => -value));
const pathOf = (parts: Point[][], end: "Z" | "") =>
  parts.map((part) => `M${thinned(part, THIN_PX).map(([px, py]) => `${px.toFixed(1)} ${py.toFixed(1)}`).join("L")}${end}`).join("");

/** The chart beside the sign-in form: data, drawn as a chart of depths, forward above slack and reverse below it. */
export function ReversalChart({ chart }: { chart: ReversalChartData }) {
  const [x, y] = [SCALES.x(chart.timeS.length), SCALES.y(chart.duty.length)];
  const levels = levelsOf(chart);
  const placed = placeWords(chart, x, y);
  return (
    <svg viewBox={`0 0 ${BOX.width} ${BOX.height}`} className="block size-full max-h-dvh" role="img" aria-label="Motor current after a change of command, by time and by duty: forward above the line of zero current, reverse below it">
      {levels.map(({ level, area }) => area && <path key={level} d={area} fillRule="evenodd" fill={level > 0 ? "var(--fwd-fill)" : "var(--rev-fill)"} opacity={level > 0 ? 0.2 : 0.13} />)}
      {levels.map(({ level, line }) => (
        <path key={level} d={line} fill="none" strokeLinejoin="round" {...strokeOf(level)} />
      ))}
      <Figures field={chart.currentA} x={x} y={y} isTaken={(px, py) => isNearWord(placed.words, px, py)} />
      <ChartWords {...placed} />
      <ChartFrame chart={chart} />
    </svg>
  );
}

function strokeOf(level: number) {
  if (level === 0) return { stroke: "var(--ink)", strokeWidth: 2.4 };
  const stroke = level > 0 ? "var(--fwd)" : "var(--rev)";
  return isWhole(level) ? { stroke, strokeWidth: 1 } : { stroke, strokeWidth: 0.8, strokeDasharray: "5 3", opacity: 0.45 };
}

type Scale = { (value: number): number; invert: (value: number) => number };

/** Figures as on a chart of depths: whole ampere, tenths below the line. Strewn evenly, the same on every page. */
function Figures({ field, x, y, isTaken }: { field: Field; x: Scale; y: Scale; isTaken: (px: number, py: number) => boolean }) {
  const figures: { px: number; py: number; tenths: number }[] = [];
  for (let row = 0; BOX.top + 26 + row * FIGURES.dy < BOX.height - BOX.bottom - 12; row += 1)
    for (let column = 0; column < 12; column += 1) {
      const turn = Math.sin(row * 12.9898 + column * 78.233) * 43758.5453;
      const shift = 2 * (turn - Math.floor(turn)) - 1;
      const px = BOX.left + 30 + column * FIGURES.dx + (row % 2) * 0.5 * FIGURES.dx + shift * FIGURES.jitter;
      const py = BOX.top + 26 + row * FIGURES.dy + shift * FIGURES.jitter * (column % 2 === 0 ? 1 : -1);
      if (px > BOX.width - BOX.right - 18 || isTaken(px, py)) continue;
      figures.push({ px, py, tenths: Math.round(Math.abs(valueAt(field, x.invert(px), y.invert(py))) * 10) });
    }
  return figures.map(({ px, py, tenths }) => (
    <text key={`${px} ${py}`} x={px.toFixed(1)} y={(py + 4).toFixed(1)} textAnchor="middle" className="chart-figure">
      {Math.floor(tenths / 10)}
      <tspan dy={4} fontSize={11}>
        {tenths % 10}
      </tspan>
    </text>
  ));
}
