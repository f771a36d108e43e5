import { scaleLinear } from "d3-scale";
import { area, line } from "d3-shape";
import type { ReversalChartData } from "@/lib/explain/reversal-chart";
import { levelAlongColumns, unbroken } from "./contours";

const WIDTH = 920;
const HEIGHT = 880;
const EDGE = { left: 46, right: 12, top: 12, bottom: 36 };
const STEP_A = 1;

/** The chart beside the sign-in form: data, drawn as a chart of depths, forward above slack and reverse below it. */
export function ReversalChart({ chart }: { chart: ReversalChartData }) {
  const { timeS, duty, currentA, commandS } = chart;
  const x = scaleLinear().domain([0, timeS[timeS.length - 1]!]).range([EDGE.left, WIDTH - EDGE.right]);
  const y = scaleLinear().domain([0, duty.length - 1]).range([HEIGHT - EDGE.bottom, EDGE.top]);
  const dutyY = scaleLinear().domain([duty[0]!, duty[duty.length - 1]!]).range(y.range());
  const flat = currentA.flat();
  const top = Math.ceil(Math.max(...flat) / STEP_A);
  const bottom = Math.floor(Math.min(...flat) / STEP_A);
  const levels = Array.from({ length: top - bottom + 1 }, (_, n) => (bottom + n) * STEP_A);
  const lines = levels.map((level) => ({ level, parts: unbroken(levelAlongColumns(currentA, level)) }));
  const path = line<{ column: number; row: number }>((p) => x(timeS[p.column]!), (p) => y(p.row));
  const rows = duty.length - 1;
  const shade = (level: number) =>
    area<number>((c) => x(timeS[c]!))
      .y0((c) => y(levelRow(currentA, c, level, rows)))
      .y1(y(level >= 0 ? rows : 0))(timeS.map((_, c) => c));
  return (
    <svg viewBox={`0 0 ${WIDTH} ${HEIGHT}`} className="h-full max-h-[calc(100dvh-24px)] w-full" preserveAspectRatio="xMidYMid meet" role="img" aria-label="Motor current after a change of command, by time and by duty: forward above the line of zero current, reverse below it">
      {levels.filter((level) => level !== 0).map((level) => (
        <path key={`fill ${level}`} d={shade(level) ?? undefined} fill={level > 0 ? "var(--fwd-fill)" : "var(--rev-fill)"} opacity={0.16} />
      ))}
      {lines.map(({ level, parts }) =>
        parts.map((part, n) => (
          <path key={`${level} ${n}`} d={path(part) ?? undefined} fill="none" stroke={level === 0 ? "var(--ink)" : level > 0 ? "var(--fwd)" : "var(--rev)"} strokeWidth={level === 0 ? 2.4 : 1} strokeDasharray={level % 2 === 0 ? undefined : "5 4"} />
        )),
      )}
      {lines.map(({ level, parts }) => {
        const part = parts[parts.length - 1];
        if (!part || part.length < 12 || level === 0) return null;
        const at = part[Math.floor(part.length * (level % 2 === 0 ? 0.72 : 0.5))]!;
        return (
          <text key={`figure ${level}`} x={x(timeS[at.column]!)} y={y(at.row) + 5} textAnchor="middle" style={{ font: "italic 16px var(--serif)" }} fill="var(--ink)" stroke="var(--paper)" strokeWidth={4} paintOrder="stroke">
            {Math.abs(level)}
          </text>
        );
      })}
      <line x1={x(commandS)} x2={x(commandS)} y1={EDGE.top} y2={HEIGHT - EDGE.bottom} stroke="var(--ink)" strokeDasharray="6 5" />
      <text x={x(commandS) - 6} y={EDGE.top + 22} textAnchor="end" fontSize={12} fill="var(--ink2)">command</text>
      <text x={x(4.4e-4)} y={dutyY(0.4)} style={{ font: "italic 34px var(--serif)", letterSpacing: "0.3em" }} fill="var(--fwd)" textAnchor="middle">Forward</text>
      <text x={x(4.6e-4)} y={dutyY(-0.62)} style={{ font: "italic 34px var(--serif)", letterSpacing: "0.3em" }} fill="var(--rev)" textAnchor="middle">Reverse</text>
      <Frame x={x} dutyY={dutyY} />
      <Title note={chart.note} />
    </svg>
  );
}

/** Row of a level in a column, clamped to the field. */
function levelRow(field: readonly (readonly number[])[], column: number, level: number, rows: number): number {
  const only = levelAlongColumns(field.map((row) => [row[column]!]), level)[0];
  if (only !== null && only !== undefined) return only;
  return field[0]![column]! > level ? 0 : rows;
}

type Scale = (value: number) => number;

/** Axes and the graduated border. */
function Frame({ x, dutyY }: { x: Scale; dutyY: Scale }) {
  const right = WIDTH - EDGE.right;
  const foot = HEIGHT - EDGE.bottom;
  return (
    <g fill="var(--ink3)" fontSize={12}>
      <rect x={EDGE.left} y={EDGE.top} width={right - EDGE.left} height={foot - EDGE.top} fill="none" stroke="var(--ink)" />
      {Array.from({ length: 6 }, (_, n) => n * 1e-4).map((t, n) => (
        <g key={t}>
          <rect x={x(t)} y={foot} width={x(1e-4) - x(0)} height={6} fill={n % 2 === 0 ? "var(--ink)" : "none"} stroke="var(--ink)" />
          <text x={x(t)} y={foot + 22} textAnchor="middle">{Math.round(t * 1e6)}</text>
        </g>
      ))}
      <text x={right} y={foot + 22} textAnchor="end">600 µs</text>
      {[-0.8, -0.6, -0.4, -0.2, 0, 0.2, 0.4, 0.6].map((u) => (
        <text key={u} x={EDGE.left - 7} y={dutyY(u) + 4} textAnchor="end">{u === 0 ? "0" : `${u > 0 ? "+" : "−"}${Math.round(Math.abs(u) * 100)}`}</text>
      ))}
      <text x={EDGE.left - 7} y={EDGE.top + 8} textAnchor="end">duty %</text>
    </g>
  );
}

function Title({ note }: { note: string }) {
  return (
    <g transform={`translate(${EDGE.left + 26} ${HEIGHT - EDGE.bottom - 152})`}>
      <rect width={312} height={126} fill="var(--paper)" stroke="var(--ink)" />
      <rect x={4} y={4} width={304} height={118} fill="none" stroke="var(--ink)" strokeWidth={0.7} />
      <text x={156} y={28} textAnchor="middle" fontSize={10.5} letterSpacing="0.09em" fontWeight={600} fill="var(--ink2)">MOTOR CURRENT</text>
      <text x={156} y={56} textAnchor="middle" style={{ font: "400 23px var(--serif)" }} fill="var(--ink)">A motor under a new command</text>
      <text x={156} y={78} textAnchor="middle" fontSize={12} fill="var(--ink2)">by time and by the duty commanded at 100 µs</text>
      <line x1={24} x2={288} y1={88} y2={88} stroke="var(--edge)" />
      <text x={156} y={108} textAnchor="middle" fontSize={12} fill="var(--ink2)">{note} · lines every 1 A, heavy: zero</text>
    </g>
  );
}
