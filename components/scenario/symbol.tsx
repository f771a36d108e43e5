import styles from "./inputs.module.css";

/** A quantity symbol: italic serif, what follows the underscore below the line. */
export function QuantitySymbol({ symbol }: { symbol: string }) {
  const [letter, below] = symbol.split("_");
  return (
    <span className={styles.symbol} aria-hidden="true">
      {letter}
      {below && <sub>{below}</sub>}
    </span>
  );
}
