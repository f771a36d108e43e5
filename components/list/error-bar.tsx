const HALF = 48;
const LIMIT_AT = 34;

/** The worst error of a run as a bar about zero; the dashed marks are its limit, so bars of unlike scenarios compare. An arrowhead says that a bar leaves the scale. */
export function ErrorBar({ errorA, limitA }: { errorA: number; limitA: number }) {
  const share = errorA / limitA;
  const length = Math.min(share * LIMIT_AT, HALF - 2);
  const isOver = share > 1;
  const colour = isOver ? "var(--fault)" : "var(--ink2)";
  return (
    <svg width={2 * HALF} height="16" viewBox={`${-HALF} -8 ${2 * HALF} 16`} aria-hidden focusable={false} className="flex-none">
      <path d={`M${-HALF} 0H${HALF}`} stroke="var(--rule)" />
      <path d="M0 -6V6" stroke="var(--ink)" />
      <rect x={-length} y={-2.5} width={2 * length} height={5} fill={colour} />
      <path d={`M${-LIMIT_AT} -6.5V6.5M${LIMIT_AT} -6.5V6.5`} stroke="var(--ink)" strokeDasharray="2 1.5" />
      {share * LIMIT_AT > HALF - 2 && <path d={`M${-HALF + 4} -4 ${-HALF} 0l4 4M${HALF - 4} -4 ${HALF} 0l-4 4`} fill="none" stroke={colour} strokeWidth="1.5" />}
    </svg>
  );
}
