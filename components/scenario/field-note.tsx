import styles from "./inputs.module.css";

/** What a field means, for who needs it: read with the field, shown while it has focus. */
export function FieldNote({ id, text }: { id: string; text: string }) {
  return (
    <span id={id} className={styles.note}>
      {text}
    </span>
  );
}
