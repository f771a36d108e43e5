import type { LegState } from "@/lib/engine/results";
import { switchPlaces } from "./channels";
import { BYPASS_OUT, CHANNEL, type BridgeGeometry } from "./geometry";
import type { Gates } from "./words";
import styles from "./bridge.module.css";

type Props = { geometry: BridgeGeometry; gates: Gates; states: { A: LegState; B: LegState }; textSize: (nominal: number) => number };

/** Gates: two leaves along the banks when on, a mitre across when off; the flap of a diode that conducts is solid. */
export function Switches({ geometry, gates, states, textSize }: Props) {
  const isOn = { AH: gates.highA, AL: gates.lowA, BH: gates.highB, BL: gates.lowB };
  return (
    <g>
      {switchPlaces(geometry).map((place) => {
        const { name, x, y, out } = place;
        const state = states[name.startsWith("A") ? "A" : "B"];
        const isDiode = state === (name.endsWith("H") ? "high diode" : "low diode");
        const half = CHANNEL / 2;
        const flapX = x + out * BYPASS_OUT;
        const anchor = out === -1 ? "start" : "end";
        const textX = x - out * 15;
        return (
          <g key={name}>
            {isOn[name] ? (
              <path d={`M${x - half - 0.5} ${y - 11}V${y + 11}M${x + half + 0.5} ${y - 11}V${y + 11}`} stroke="var(--ink)" strokeWidth="3.4" />
            ) : (
              <>
                <rect x={x - half} y={y - 8} width={CHANNEL} height="16" fill="var(--sheet)" />
                <path d={`M${x - half - 1.5} ${y + 5}L${x} ${y - 6}L${x + half + 1.5} ${y + 5}`} fill="none" stroke="var(--ink)" strokeWidth="3" />
              </>
            )}
            <path d={`M${flapX - 4.5} ${y + 4}H${flapX + 4.5}L${flapX} ${y - 4}Z`} fill={isDiode ? "var(--ink)" : "var(--paper)"} stroke={isDiode ? "var(--sheet)" : "var(--ink)"} strokeWidth="1" />
            <path d={`M${flapX - 4.5} ${y - 5}H${flapX + 4.5}`} stroke="var(--ink)" strokeWidth="1.3" />
            <text x={textX} y={y - 1} textAnchor={anchor} className={styles.strong} fontSize={textSize(11.5)}>
              {name}
            </text>
            <text x={textX} y={y + 1 + textSize(11)} textAnchor={anchor} className={isOn[name] || isDiode ? styles.strong : styles.plain} fontSize={textSize(11)}>
              {isOn[name] ? "on" : isDiode ? "diode" : "off"}
            </text>
          </g>
        );
      })}
    </g>
  );
}
