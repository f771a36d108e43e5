/** The small signs of the product: readable by shape alone. Decorative; the words stand beside them. */

const box = { "aria-hidden": true, focusable: false } as const;

/** The mark: a tide disc, forward above, reverse below the line. */
export function Mark({ size = 26 }: { size?: number }) {
  return (
    <svg {...box} width={size} height={size} viewBox="0 0 26 26" fill="none">
      <circle cx="13" cy="13" r="11.5" stroke="var(--ink)" strokeWidth="1.4" />
      <path d="M7 13a6 6 0 0 1 12 0z" fill="var(--fwd)" />
      <path d="M8.5 15.5h11M10 18h8" stroke="var(--rev)" strokeWidth="1.6" />
      <path d="M1.5 13h23" stroke="var(--ink)" strokeWidth="1.4" />
      <path d="M13 1.5v3M13 21.5v3" stroke="var(--ink)" strokeWidth="1.4" />
    </svg>
  );
}

export function FaultSign() {
  return (
    <svg {...box} width="16" height="16" viewBox="0 0 16 16">
      <path d="M5 1h6l4 4v6l-4 4H5l-4-4V5z" fill="var(--fault)" />
      <path d="M8 4v5M8 11v1.4" stroke="var(--paper)" strokeWidth="1.8" />
    </svg>
  );
}

export function CautionSign() {
  return (
    <svg {...box} width="16" height="16" viewBox="0 0 16 16" fill="none">
      <path d="M8 1.5 15 14H1z" stroke="var(--caution)" strokeWidth="1.5" fill="var(--caution-tint)" />
      <path d="M8 6v4M8 11v1.4" stroke="var(--caution)" strokeWidth="1.5" />
    </svg>
  );
}

export function NoteSign() {
  return (
    <svg {...box} width="16" height="16" viewBox="0 0 16 16" fill="none">
      <circle cx="8" cy="8" r="6.5" stroke="var(--ink2)" strokeWidth="1.3" />
      <path d="M8 7v4.5M8 4.2v1.4" stroke="var(--ink2)" strokeWidth="1.5" />
    </svg>
  );
}
