/** The small signs of the product: readable by shape alone. Decorative; the words stand beside them. */

const box = { "aria-hidden": true, focusable: false } as const;

/** The mark: a tide about its line, forward above it, reverse ruled below it, in the ring of a compass. */
export function Mark({ size = 26 }: { size?: number }) {
  return (
    <svg {...box} width={size} height={size} viewBox="0 0 26 26" fill="none" className="flex-none">
      <path d="M3 13A5 5.6 0 0 1 13 13Z" fill="var(--fwd)" />
      <path d="M13 13A5 5.6 0 0 0 23 13Z" fill="var(--rev)" />
      <path d="M14.6 14.7H21.4M15.6 16.6H20.4" stroke="var(--paper)" strokeWidth="0.9" />
      <path d="M0.5 13H25.5" stroke="var(--ink)" strokeWidth="1.3" />
      <circle cx="13" cy="13" r="12" stroke="var(--ink)" strokeWidth="1.1" />
      <path d="M13 0.4V3M13 23V25.6" stroke="var(--ink)" strokeWidth="1.1" />
    </svg>
  );
}

/** Forward: the feathered arrow of a flood stream. */
export function ForwardSign() {
  return (
    <svg {...box} width="18" height="10" viewBox="0 0 18 10" fill="none">
      <path d="M1 5H16M12 1.6 16.4 5 12 8.4M1.2 5 4 1.6M4.2 5 7 1.6" stroke="var(--fwd)" strokeWidth="1.6" strokeLinecap="round" strokeLinejoin="round" />
    </svg>
  );
}

/** Reverse: the bare arrow of an ebb stream. */
export function ReverseSign() {
  return (
    <svg {...box} width="18" height="10" viewBox="0 0 18 10" fill="none">
      <path d="M17 5H2M6 1.6 1.6 5 6 8.4" stroke="var(--rev)" strokeWidth="1.6" strokeLinecap="round" strokeLinejoin="round" />
    </svg>
  );
}

export function SearchSign() {
  return (
    <svg {...box} width="13" height="13" viewBox="0 0 13 13" fill="none">
      <circle cx="5.3" cy="5.3" r="4" stroke="var(--ink2)" strokeWidth="1.5" />
      <path d="M8.4 8.4 12 12" stroke="var(--ink2)" strokeWidth="1.7" />
    </svg>
  );
}

export function FaultSign() {
  return (
    <svg {...box} width="16" height="16" viewBox="0 0 16 16">
      <path d="M5 1h6l4 4v6l-4 4H5l-4-4V5z" fill="var(--fault)" />
      <path d="M8 4v5M8 10.7v1.5" stroke="var(--paper)" strokeWidth="1.8" />
    </svg>
  );
}

export function CautionSign() {
  return (
    <svg {...box} width="16" height="16" viewBox="0 0 16 16" fill="none">
      <path d="M8 1.6 15 14.2H1Z" stroke="var(--caution)" strokeWidth="1.4" strokeLinejoin="round" fill="var(--caution-tint)" />
      <path d="M8 6v4M8 11.3v1.3" stroke="var(--caution)" strokeWidth="1.5" />
    </svg>
  );
}

export function NoteSign() {
  return (
    <svg {...box} width="16" height="16" viewBox="0 0 16 16" fill="none">
      <circle cx="8" cy="8" r="6.6" stroke="var(--ink2)" strokeWidth="1.3" />
      <path d="M8 7v4.6M8 4.2v1.4" stroke="var(--ink2)" strokeWidth="1.5" />
    </svg>
  );
}
