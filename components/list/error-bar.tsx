/** The worst error of a run as a bar about zero with its limit marked; one scale for the whole list. */
export function ErrorBar({ errorA, scaleA }: { errorA: number; scaleA: number }) {
  const half = 45;
  const length = Math.min(errorA / (scaleA || 1), 1) * half;
  const isOver = errorA > scaleA * 0.999;
  return (
    <svg width="96" height="14" viewBox="-48 -7 96 14" aria-hidden focusable={false}>
      <path d="M-46 0H46" stroke="var(--rule)" />
      <path d="M0 -5V5" stroke="var(--ink2)" />
      <rect x={-length} y={-2.5} width={2 * length} height={5} fill={isOver ? "var(--fault)" : "var(--ink2)"} />
      {isOver && <path d="M-48 0l5 -4v8zM48 0l-5 -4v8z" fill="var(--fault)" />}
    </svg>
  );
}
