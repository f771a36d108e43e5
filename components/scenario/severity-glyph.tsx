import { CautionSign, FaultSign, NoteSign } from "@/components/ui/signs";
import type { Severity } from "@/lib/engine/results";
import styles from "./notices.module.css";

const SIGNS = { fault: FaultSign, caution: CautionSign, note: NoteSign };
const WORDS: Record<Severity, string> = { fault: "Fault", caution: "Caution", note: "Note" };

/** Octagon, triangle, ring: shape first, hue second; the word for who does not see it. */
export function SeverityGlyph({ severity }: { severity: Severity }) {
  const Sign = SIGNS[severity];
  return (
    <span className={styles.glyph}>
      <Sign />
      <span className="visually-hidden">{WORDS[severity]}: </span>
    </span>
  );
}
