import type { ScenarioDocument } from "@/lib/scenario/schema";
import { fixed } from "@/components/plot/ticks";
import type { BridgeGeometry } from "./geometry";
import type { StateWords } from "./words";
import styles from "./bridge.module.css";

type TextSize = (nominal: number) => number;

/** The supply, with what it does in a word. With a bus capacitor the box stands for both, and shows the bus voltage. */
export function SupplyBox({ geometry: g, busV, hasCapacitor, word, textSize }: { geometry: BridgeGeometry; busV: number; hasCapacitor: boolean; word: StateWords["supply"]; textSize: TextSize }) {
  const small = textSize(10.5);
  const halfWidth = Math.max(26, small * 2.6);
  const x = Math.max(g.xSupply, halfWidth + 1);
  const halfHeight = 15 + small * 1.3;
  return (
    <g textAnchor="middle">
      <rect x={x - halfWidth} y={g.yMid - halfHeight} width={2 * halfWidth} height={2 * halfHeight} rx="2" fill="var(--paper)" stroke="var(--ink)" strokeWidth="1.6" />
      <text x={x} y={g.yMid - 12} className={styles.caps} fontSize={small}>
        {hasCapacitor ? "Bus" : "Supply"}
      </text>
      <text x={x} y={g.yMid + 6} className={styles.numeral} fontSize={18}>
        {fixed(busV, busV >= 100 ? 0 : 1)}
        <tspan className={styles.unit} fontSize={small} dx="2">
          V
        </tspan>
      </text>
      <text x={x} y={g.yMid + 10 + small} className={styles.plain} fontSize={small}>
        {word}
      </text>
    </g>
  );
}

/** Chart signs of tidal streams: feathered forward, bare reverse, a lens for slack; readable without colour. */
export function DirectionSign({ x, y, direction, scale }: { x: number; y: number; direction: "forward" | "reverse" | "none"; scale: number }) {
  const shared = { transform: `translate(${x - 9 * scale} ${y - 5 * scale}) scale(${scale})`, strokeLinecap: "round" as const, strokeLinejoin: "round" as const };
  if (direction === "forward") return <path {...shared} d="M1 5H16M12 1.6 16.4 5 12 8.4M1.2 5 4 1.6M4.2 5 7 1.6" fill="none" stroke="var(--fwd)" strokeWidth="1.6" />;
  if (direction === "reverse") return <path {...shared} d="M17 5H2M6 1.6 1.6 5 6 8.4" fill="none" stroke="var(--rev)" strokeWidth="1.6" />;
  return <path {...shared} d="M1 5H17M5 5C6.6 2.4 11.4 2.4 13 5 11.4 7.6 6.6 7.6 5 5Z" fill="var(--paper)" stroke="var(--ink)" strokeWidth="1.4" />;
}

const LOAD_WORDS: Record<ScenarioDocument["load"]["kind"], string> = { motor: "Motor", inductive: "Coil", resistive: "Load" };

/** The load: a disc for a motor, a box with a winding or a plain resistor for the others. */
export function LoadSymbol({ geometry: g, kind, currentA, direction, textSize }: { geometry: BridgeGeometry; kind: ScenarioDocument["load"]["kind"]; currentA: number; direction: "forward" | "reverse" | "none"; textSize: TextSize }) {
  const x = (g.xA + g.xB) / 2;
  const { yMid: y, motorRadius: r } = g;
  const small = textSize(10.5);
  const amount = fixed(Math.abs(currentA), Math.abs(currentA) >= 100 ? 0 : Math.abs(currentA) >= 10 ? 1 : 2);
  return (
    <g textAnchor="middle">
      {kind === "motor" ? (
        <>
          <circle cx={x} cy={y} r={r + 3} fill="var(--paper)" stroke="var(--edge)" strokeWidth="1" />
          <circle cx={x} cy={y} r={r} fill="var(--sheet)" stroke="var(--ink)" strokeWidth="1.6" />
        </>
      ) : (
        <rect x={x - r - 8} y={y - r} width={2 * r + 16} height={2 * r} fill="var(--sheet)" stroke="var(--ink)" strokeWidth="1.6" />
      )}
      <text x={x} y={y - 10.5} className={styles.loadName} fontSize={Math.min(small, 12)}>
        {LOAD_WORDS[kind]}
      </text>
      <text x={x} y={y + 8} className={styles.numeral} fontSize={20}>
        {amount}
        <tspan className={styles.unit} fontSize={small} dx="2">
          A
        </tspan>
      </text>
      {kind !== "motor" && <LoadSign kind={kind} x={x} y={y + r + 1} />}
      <DirectionSign x={x} y={y + 18} direction={direction} scale={1.1} />
      <text x={x - r - (kind === "motor" ? 8 : 14)} y={y - 12} textAnchor="end" className={styles.faint} fontSize={small}>
        A
      </text>
      <text x={x + r + (kind === "motor" ? 8 : 14)} y={y - 12} textAnchor="start" className={styles.faint} fontSize={small}>
        B
      </text>
    </g>
  );
}

/** Standing on the lower edge of the box: four half turns, or the resistor's rectangle. */
function LoadSign({ kind, x, y }: { kind: "inductive" | "resistive"; x: number; y: number }) {
  if (kind === "resistive") return <rect x={x - 14} y={y - 4} width="28" height="8" fill="var(--paper)" stroke="var(--ink)" strokeWidth="1.4" />;
  return <path d={`M${x - 16} ${y}${"a4 4 0 0 1 8 0".repeat(4)}`} fill="var(--paper)" stroke="var(--ink)" strokeWidth="1.4" />;
}
