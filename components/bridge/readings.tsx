import type { InstantReading } from "@/lib/engine/results";
import type { SensingFacts } from "@/components/plot/sensing-facts";
import { fixed } from "@/components/plot/ticks";
import type { BridgeGeometry } from "./geometry";
import { Gauge, staffPlaces } from "./staffs";
import { limitWord, shuntWords, type ShuntWords } from "./words";
import styles from "./bridge.module.css";

type TextSize = (nominal: number) => number;
type Props = { geometry: BridgeGeometry; reading: InstantReading; facts: SensingFacts; textSize: TextSize };

const ohmText = (ohm: number): string => (ohm >= 1 ? `${Number(ohm.toPrecision(4))} Ω` : ohm >= 1e-3 ? `${Number((ohm * 1e3).toPrecision(4))} mΩ` : `${Number((ohm * 1e6).toPrecision(4))} µΩ`);

type Anchor = { x: number; y: number; anchor: "start" | "middle" | "end" };

/** Where the words of a shunt stand: outside the bridge beside leg shunts, in the supply's loop for the others. */
function placeOf(g: BridgeGeometry, facts: SensingFacts, leg: ShuntWords["leg"]): Anchor {
  const isTop = facts.site === "legTop" || facts.site === "supply";
  const y = isTop ? g.yTopStaff + 1 : facts.site === "line" ? g.yMid : g.yBottomStaff - 18;
  if (leg === "A") return { x: g.xA - 36, y, anchor: "end" };
  if (leg === "B") return { x: g.xB + 36, y, anchor: "start" };
  return { x: facts.site === "line" ? g.xA - 42 : (g.xSupply + g.xA) / 2 - 6, y: facts.site === "supply" ? y + 7 : y, anchor: facts.site === "line" ? "end" : "middle" };
}

/** Millivolt across each shunt, ampere and way, the output it makes and whether that rests on a limit. */
export function ShuntReadings({ geometry: g, reading, facts, textSize }: Props) {
  const small = textSize(11);
  return (
    <g>
      {shuntWords(reading, facts).map((shunt) => {
        const { x, y, anchor } = placeOf(g, facts, shunt.leg);
        const [number, unit] = shunt.across.split(" ");
        return (
          <g key={shunt.name} textAnchor={anchor}>
            <text x={x} y={y} className={styles.numeral} fontSize={21}>
              {number}
              <tspan className={styles.unit} fontSize={12} dx="3">
                {unit}
              </tspan>
            </text>
            <text x={x} y={y + 3 + small * 1.05} className={styles.plain} fontSize={small}>
              {shunt.flow}
            </text>
            {shunt.output !== null && (
              <text x={x} y={y + 4 + small * 2.2} className={styles.plain} fontSize={small}>
                {shunt.leg === null ? "out " : `out ${shunt.leg} `}
                <tspan className={styles.strong}>{shunt.output}</tspan>
                {shunt.limit === "" ? "" : ` · ${shunt.limit}`}
              </text>
            )}
          </g>
        );
      })}
    </g>
  );
}

/** The same beside the narrower drawing, one block under another, with the name of the shunt. */
export function ReadingColumn({ geometry: g, reading, facts, textSize }: Props) {
  const small = textSize(11);
  const line = small * 1.25;
  const x = g.xB + 40;
  return (
    <g>
      {shuntWords(reading, facts).map((shunt, index) => {
        const y = (shunt.leg === null && facts.site !== "supply") || index > 0 ? g.yMid + line * 1.6 : g.yTop + line * 0.8;
        const [number, unit] = shunt.across.split(" ");
        return (
          <g key={shunt.name}>
            <text x={x} y={y} className={styles.plain} fontSize={small}>
              <tspan className={styles.strong}>{shunt.name}</tspan> {ohmText(facts.shuntOhm)}
            </text>
            <text x={x} y={y + 22} className={styles.numeral} fontSize={20}>
              {number}
              <tspan className={styles.unit} fontSize={12} dx="3">
                {unit}
              </tspan>
            </text>
            {[shunt.flow, shunt.output === null ? "" : `${shunt.outputName.replace("output", "out")} ${shunt.output}`, shunt.limit].map((words, row) => (
              <text key={row} x={x} y={y + 24 + line * (row + 1)} className={styles.plain} fontSize={small}>
                {words}
              </text>
            ))}
          </g>
        );
      })}
    </g>
  );
}

/** "Shunt A, 10 mΩ" beside each staff. */
export function ShuntNames({ geometry: g, facts, textSize }: Omit<Props, "reading">) {
  const step = textSize(11) + 2;
  return (
    <g>
      {staffPlaces(g, facts.site).map((place) => {
        const isB = place.leg === "B";
        const x = isB ? g.xB - 15 : g.xA + 15;
        const y = place.y - 1;
        if (place.leg === null) return <NameInLoop key="loop" geometry={g} facts={facts} size={textSize(11)} />;
        return (
          <g key={place.leg} textAnchor={isB ? "end" : "start"}>
            <text x={x} y={y} className={styles.strong} fontSize={textSize(11.5)}>
              Shunt {place.leg}
            </text>
            <text x={x} y={y + step} className={styles.plain} fontSize={textSize(11)}>
              {ohmText(facts.shuntOhm)}
            </text>
          </g>
        );
      })}
    </g>
  );
}

/** The single shunt's name stands with its reading in the supply's loop, where there is room at every site. */
function NameInLoop({ geometry: g, facts, size }: { geometry: BridgeGeometry; facts: SensingFacts; size: number }) {
  const place = placeOf(g, facts, null);
  const y = facts.site === "supply" ? place.y + 6 + size * 2.2 : place.y - 22;
  return (
    <text x={place.x} y={y} textAnchor={place.anchor} className={styles.plain} fontSize={size}>
      <tspan className={styles.strong}>Shunt</tspan> {ohmText(facts.shuntOhm)}
    </text>
  );
}

/** The gauge of what the converter reads, inside the lower loop. */
export function OutputGauge({ geometry: g, reading, facts, textSize, idealV }: Props & { idealV: number | null }) {
  const xm = (g.xA + g.xB) / 2;
  const y = g.yMid + 20;
  const height = g.yBottom - 16 - y;
  const isForward = reading.motorCurrentA >= 0;
  const value = facts.readingTrace === "combinedV" ? reading.combinedV : facts.readingTrace === "differenceV" ? reading.differenceV : reading.outAV;
  if (value === null) return null;
  const isPair = facts.readingTrace === "differenceV";
  const span = { minV: isPair ? -facts.outputMaxV : Math.min(0, facts.outputMinV), maxV: facts.outputMaxV };
  const baseV = facts.readingTrace === "combinedV" ? (facts.referenceV ?? 0) : 0;
  const fill = isForward ? "var(--fwd-fill)" : "var(--rev-fill)";
  const name = facts.readingTrace === "combinedV" ? (facts.isLegSite ? "Combined" : "Output") : isPair ? "Difference" : "Output";
  const word = isPair ? "" : limitWord(value, facts);
  const gapV = idealV === null ? 0 : Math.abs(idealV - value);
  const isWrong = gapV > facts.sampleLimitA * facts.gainRatio * facts.shuntOhm;
  const small = textSize(11);
  const x = xm - (g.xB - g.xA < 220 ? 50 : 58);
  const top = g.yMid + g.motorRadius + 3 + small;
  return (
    <g>
      <Gauge x={x} y={y} width={15} height={height} {...span} valueV={value} baseV={baseV} fill={fill} hasMidscale={facts.readingTrace === "combinedV"} />
      <g>
        <text x={x + 34} y={top} className={styles.caps} fontSize={textSize(10.5)}>
          {name}
        </text>
        <text x={x + 34} y={top + 20} className={styles.numeral} fontSize={19}>
          {fixed(value, 3, isPair)}
          <tspan className={styles.unit} fontSize={11} dx="2">
            V
          </tspan>
        </text>
        <text x={x + 34} y={top + 23 + small} className={isWrong ? styles.wrong : styles.plain} fontSize={small}>
          {isWrong ? `should be ${fixed(idealV ?? 0, 3)}` : word}
        </text>
      </g>
    </g>
  );
}
