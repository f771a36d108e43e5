import { scaleLinear } from "d3-scale";
import type { ReversalChartData } from "@/lib/explain/reversal-chart";
import { ForwardSign, ReverseSign } from "@/components/ui/signs";
import { MINUS } from "@/lib/units/format";
import { BOX } from "./chart-box";

const BAND = 9;
const EDGE = { right: BOX.width - BOX.right, foot: BOX.height - BOX.bottom };

/** The graduated border on all four sides, one segment a PWM period or ten per cent of duty, with the scales; and the title in its corner. */
export function ChartFrame({ chart }: { chart: ReversalChartData }) {
  const { timeS, duty, commandS, periodS } = chart;
  const endS = timeS[timeS.length - 1]!;
  const x = scaleLinear([0, endS], [BOX.left, EDGE.right]);
  const y = scaleLinear([duty[0]!, duty[duty.length - 1]!], [EDGE.foot, BOX.top]);
  const periods = Array.from({ length: Math.round(endS / periodS) }, (_, n) => n).filter((n) => n % 2 === 0);
  const tens = Array.from({ length: 16 }, (_, n) => 0.6 - n * 0.1).filter((u, n) => n % 2 === 0 && u - 0.1 > duty[0]!);
  const bar = (key: string, left: number, top: number, width: number, height: number) => <rect key={key} x={left} y={top} width={width} height={height} fill="var(--ink)" />;
  return (
    <g fontSize={11} fill="var(--ink2)">
      <path d={`M${x(commandS)} ${BOX.top}V${EDGE.foot}`} stroke="var(--ink)" strokeWidth={0.9} strokeDasharray="8 4" />
      <text x={x(commandS) - 6} y={BOX.top + 18} textAnchor="end" className="chart-halo">
        command
      </text>
      <rect x={BOX.left} y={BOX.top} width={EDGE.right - BOX.left} height={EDGE.foot - BOX.top} fill="none" stroke="var(--ink)" />
      <rect x={BOX.left - BAND} y={BOX.top - BAND} width={EDGE.right - BOX.left + 2 * BAND} height={EDGE.foot - BOX.top + 2 * BAND} fill="none" stroke="var(--ink)" strokeWidth={1.6} />
      {periods.flatMap((n) => [BOX.top - BAND + 2, EDGE.foot + 2].map((top) => bar(`t${n} ${top}`, x(n * periodS), top, x(periodS) - x(0), BAND - 4)))}
      {tens.flatMap((u) => [BOX.left - BAND + 2, EDGE.right + 2].map((left) => bar(`u${u} ${left}`, left, y(u), BAND - 4, y(0) - y(0.1))))}
      {[0, 1, 2, 3, 4, 5, 6].map((n) => (
        <text key={n} x={x(n * 1e-4)} y={EDGE.foot + BAND + 15} textAnchor="middle">
          {n * 100}
          {n === 6 && " µs"}
        </text>
      ))}
      {[60, 40, 20, 0, -20, -40, -60, -80].map((percent) => (
        <text key={percent} x={BOX.left - BAND - 6} y={y(percent / 100) + 4} textAnchor="end">
          {percent > 0 ? `+${percent}` : percent < 0 ? `${MINUS}${-percent}` : "0"}
        </text>
      ))}
      <text x={BOX.left - BAND} y={BOX.top - BAND - 6} fill="var(--ink3)">
        duty, %
      </text>
      <Cartouche chart={chart} />
    </g>
  );
}

function Cartouche({ chart }: { chart: ReversalChartData }) {
  const middle = 158;
  return (
    <g transform={`translate(${BOX.left + 40} ${EDGE.foot - 232})`} textAnchor="middle">
      <rect width={316} height={186} fill="var(--paper)" stroke="var(--ink)" />
      <rect x={4} y={4} width={308} height={178} fill="none" stroke="var(--ink)" strokeWidth={0.6} />
      <text x={middle} y={34} fontSize={10} fontWeight={600} letterSpacing="0.075em">
        MOTOR CURRENT
      </text>
      <text x={middle} y={64} fill="var(--ink)" style={{ font: "400 25px var(--serif)" }}>
        {chart.title}
      </text>
      <text x={middle} y={84}>by time and by the duty commanded</text>
      <path d="M30 97H286" stroke="var(--ink)" strokeWidth={0.8} />
      <text x={middle} y={116}>{chart.note}</text>
      <text x={middle} y={134} fill="var(--ink)" style={{ font: "italic 400 13.5px var(--serif)" }}>
        Figures in ampere and tenths; lines every 0.5 A
      </text>
      <g textAnchor="start">
        <path d="M40 158H72" stroke="var(--ink)" strokeWidth={2.4} />
        <text x={79} y={162}>slack</text>
        <g transform="translate(125 153)">
          <ForwardSign />
        </g>
        <text x={149} y={162}>forward</text>
        <g transform="translate(206 153)">
          <ReverseSign />
        </g>
        <text x={230} y={162}>reverse</text>
      </g>
    </g>
  );
}
