import { useId } from "react";

const WIDTH = 196;
const HEIGHT = 44;
const MARGIN = 2;

/** The currents a list's sparks are drawn between; zero lies inside. */
export type SparkScale = { lowA: number; highA: number };

type Props = { minA: number[]; maxA: number[]; scale: SparkScale; label: string };

/** The motor current of a run in small: forward solid above the line, reverse ruled below it, on a scale shared by the list. */
export function Spark({ minA, maxA, scale, label }: Props) {
  const id = useId();
  const spanA = scale.highA - scale.lowA || 1;
  const x = (i: number) => ((WIDTH * i) / Math.max(maxA.length - 1, 1)).toFixed(1);
  const y = (a: number) => (MARGIN + ((scale.highA - a) / spanA) * (HEIGHT - 2 * MARGIN)).toFixed(1);
  const middle = maxA.map((high, i) => 0.5 * (high + minA[i]!));
  const edge = (clip: (a: number) => number) => `M${middle.map((a, i) => `${x(i)} ${y(clip(a))}`).join("L")}`;
  const zero = y(0);
  const forward = edge((a) => Math.max(a, 0));
  const reverse = edge((a) => Math.min(a, 0));
  const closed = (line: string) => `${line}L${WIDTH} ${zero}L0 ${zero}Z`;
  return (
    <svg width={WIDTH} height={HEIGHT} viewBox={`0 0 ${WIDTH} ${HEIGHT}`} role="img" aria-label={label} className="block max-w-full">
      <defs>
        <pattern id={id} width="6" height="3" patternUnits="userSpaceOnUse">
          <rect width="6" height="3" fill="var(--rev-fill)" opacity="0.42" />
          <path d="M0 .5H6" stroke="var(--rev)" strokeWidth="0.8" opacity="0.75" />
        </pattern>
      </defs>
      <path d={closed(forward)} fill="var(--fwd-fill)" opacity="0.72" />
      <path d={closed(reverse)} fill={`url(#${id})`} />
      <path d={forward} fill="none" stroke="var(--fwd)" strokeWidth="1.2" strokeLinejoin="round" />
      <path d={reverse} fill="none" stroke="var(--rev)" strokeWidth="1.2" strokeLinejoin="round" />
      <path d={`M0 ${zero}H${WIDTH}`} stroke="var(--ink2)" strokeWidth="1" />
    </svg>
  );
}
