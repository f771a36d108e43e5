import { useId } from "react";

const WIDTH = 190;
const HEIGHT = 34;

type Props = { minA: number[]; maxA: number[]; scaleA: number; label: string };

/** The motor current of a run in small: forward solid above the line, reverse ruled below it, on a scale shared by the list. */
export function Spark({ minA, maxA, scaleA, label }: Props) {
  const id = useId();
  const n = maxA.length;
  const x = (i: number) => (WIDTH * i) / Math.max(n - 1, 1);
  const y = (a: number) => HEIGHT / 2 - (a / (scaleA || 1)) * (HEIGHT / 2 - 2);
  const middle = maxA.map((high, i) => 0.5 * (high + minA[i]!));
  const edge = (clip: (a: number) => number) => middle.map((a, i) => `${x(i).toFixed(1)},${y(clip(a)).toFixed(1)}`).join("L");
  const closed = (clip: (a: number) => number) => `M0,${HEIGHT / 2}L${edge(clip)}L${WIDTH},${HEIGHT / 2}Z`;
  return (
    <svg width={WIDTH} height={HEIGHT} viewBox={`0 0 ${WIDTH} ${HEIGHT}`} role="img" aria-label={label} className="max-w-full">
      <defs>
        <pattern id={id} width="6" height="4" patternUnits="userSpaceOnUse">
          <rect width="6" height="4" fill="var(--rev-tint)" />
          <path d="M0 2h6" stroke="var(--rev)" strokeWidth="1" />
        </pattern>
      </defs>
      <path d={closed((a) => Math.max(a, 0))} fill="var(--fwd-fill)" />
      <path d={closed((a) => Math.min(a, 0))} fill={`url(#${id})`} />
      <path d={`M${edge((a) => a)}`} fill="none" stroke="var(--ink2)" strokeWidth="1" />
      <path d={`M0 ${HEIGHT / 2}H${WIDTH}`} stroke="var(--edge)" strokeWidth="0.8" />
    </svg>
  );
}
