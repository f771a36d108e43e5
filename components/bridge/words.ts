import type { Band, Conduction, InstantReading, LegName } from "@/lib/engine/results";
import type { SensingFacts } from "@/components/plot/sensing-facts";
import { fixed, unitScale } from "@/components/plot/ticks";
import { flowOf, routeOf, type Flow } from "./flow";

export type Gates = Band["gates"];
export type StateWords = {
  /** "Return to supply" */
  title: string;
  /** "AL and BH", "dead time: AL diode and BL" */
  who: string;
  supply: "gives" | "takes back" | "idle";
  /** The state in sentences: the drawing's text for those who do not see it. */
  sentence: string;
};

const TITLES: Record<Exclude<Conduction, "deadTime">, string> = {
  driveForward: "Drive, forward",
  driveReverse: "Drive, reverse",
  returnToSupply: "Return to supply",
  recirculateLow: "Recirculation",
  recirculateHigh: "Recirculation",
  coasting: "Coasting",
  shootThrough: "Shoot-through",
};

/** Titles by route, for dead time: the words say what the current does, and that no switch has closed yet. */
const ROUTE_TITLES = { driveForward: "Drive, forward", driveReverse: "Drive, reverse", returnForward: "Return to supply", returnReverse: "Return to supply", low: "Recirculation", high: "Recirculation", none: "No current" };

/** The conduction of an instant when no band tells it. A diode in one leg only is taken for dead time; a band knows better (recirculation through a diode). */
export function conductionOf(reading: InstantReading, gates?: Gates): Conduction {
  const flow = flowOf(reading);
  if (flow.A.throughA > 0 || flow.B.throughA > 0) return "shootThrough";
  const isOff = (leg: LegName) => (gates === undefined ? !reading.state[leg].endsWith("channel") : leg === "A" ? !gates.highA && !gates.lowA : !gates.highB && !gates.lowB);
  if (isOff("A") && isOff("B")) return "coasting";
  if (isOff("A") || isOff("B")) return "deadTime";
  const route = routeOf(flow);
  if (route === "low") return "recirculateLow";
  if (route === "high") return "recirculateHigh";
  return route === "driveForward" || route === "driveReverse" ? route : "returnToSupply";
}

const elementOf = (reading: InstantReading, leg: LegName): string => {
  const state = reading.state[leg];
  if (state === "open") return `leg ${leg} open`;
  return `${leg}${state.startsWith("high") ? "H" : "L"}${state.endsWith("diode") ? " diode" : ""}`;
};

function whoOf(reading: InstantReading, conduction: Conduction, flow: Flow): string {
  if (conduction === "shootThrough") {
    const legs = (["A", "B"] as const).filter((leg) => flow[leg].throughA > 0);
    return legs.map((leg) => `${leg}H and ${leg}L both on`).join(", ");
  }
  const pair = `${elementOf(reading, "A")} and ${elementOf(reading, "B")}`;
  if (conduction === "coasting" && reading.state.A === "open" && reading.state.B === "open") return "all off, no current";
  return conduction === "deadTime" ? `dead time: ${pair}` : pair;
}

/** The supply's share: under a thousandth of the largest current of the instant it is idle. */
function supplyWord(reading: InstantReading): StateWords["supply"] {
  const floorA = Math.max(1e-3 * Math.abs(reading.motorCurrentA), 1e-6);
  if (Math.abs(reading.bridgeA) <= floorA) return "idle";
  return reading.bridgeA > 0 ? "gives" : "takes back";
}

export const directionWord = (currentA: number, floorA: number): "forward" | "reverse" | "none" => (Math.abs(currentA) < floorA ? "none" : currentA > 0 ? "forward" : "reverse");

/** What happens in the bridge, in trade terms. `band` (from the view) is trusted over a guess from the reading. */
export function describeState(reading: InstantReading, facts: SensingFacts, fullScaleA: number, band?: Pick<Band, "conduction" | "gates"> | null): StateWords {
  const flow = flowOf(reading);
  const conduction = band?.conduction ?? conductionOf(reading, band?.gates);
  const title = conduction === "deadTime" ? ROUTE_TITLES[routeOf(flow)] : TITLES[conduction];
  const who = whoOf(reading, conduction, flow);
  const supply = supplyWord(reading);
  const direction = directionWord(reading.motorCurrentA, fullScaleA * 0.005);
  const motor = direction === "none" ? `${facts.loadName} current is near zero` : `${facts.loadName} ${fixed(Math.abs(reading.motorCurrentA), 2)} A ${direction}`;
  const detail = conduction === "recirculateLow" ? ", low side" : conduction === "recirculateHigh" ? ", high side" : "";
  const shunts = shuntWords(reading, facts).map((shunt) => `${shunt.name} ${shunt.across} across, ${shunt.flow}${shunt.output === null ? "" : `, ${shunt.outputName} ${shunt.output}${shunt.limit === "" ? "" : ` ${shunt.limit}`}`}`);
  const supplyText = supply === "idle" ? "The supply is idle" : `The supply ${supply} ${fixed(Math.abs(reading.bridgeA), 2)} A`;
  return { title, who, supply, sentence: [`${title}${detail}: ${who}`, motor, supplyText, ...shunts, ...readingWords(reading, facts)].join(". ") + "." };
}

const readingWords = (reading: InstantReading, facts: SensingFacts): string[] =>
  reading.combinedV !== null ? [`Combined output ${fixed(reading.combinedV, 3)} V${limitWord(reading.combinedV, facts) === "" ? "" : ` ${limitWord(reading.combinedV, facts)}`}`] : reading.differenceV !== null ? [`Difference ${fixed(reading.differenceV, 3)} V`] : [];

/** An output within a thousandth of its span of a limit is at it; the same holds for the midscale reference. */
export function limitWord(outputV: number, facts: SensingFacts): "at floor" | "at ceiling" | "at midscale" | "" {
  const closeV = (facts.outputMaxV - facts.outputMinV) * 1e-3;
  if (outputV - facts.outputMinV < closeV) return "at floor";
  if (facts.outputMaxV - outputV < closeV) return "at ceiling";
  return facts.readingTrace === "combinedV" && facts.referenceV !== null && Math.abs(outputV - facts.referenceV) < 2 * closeV ? "at midscale" : "";
}

export type ShuntWords = { leg: LegName | null; name: string; senseV: number; across: string; currentA: number; flow: string; outputName: string; output: string | null; limit: string };

const acrossText = (senseV: number): string => {
  const { factor, unit } = unitScale(Math.max(Math.abs(senseV), 1e-3), "V");
  return `${fixed(senseV / factor, factor === 1 ? 3 : 1, true)} ${unit}`;
};

/** Words that say which way the current runs in a shunt of each site, for positive and negative current. */
const FLOW_WORDS: Record<SensingFacts["site"], readonly [string, string]> = {
  legTop: ["down", "up"],
  legBottom: ["down", "up"],
  line: ["forward", "reverse"],
  supply: ["to the bridge", "to the supply"],
  return: ["to ground", "to the bridge"],
};

/** One entry per shunt of the site: two for the legs, one elsewhere. */
export function shuntWords(reading: InstantReading, facts: SensingFacts): ShuntWords[] {
  const { site } = facts;
  const entry = (leg: LegName | null, currentA: number, senseV: number, outV: number | null): ShuntWords => {
    const isIdle = Math.abs(currentA) < facts.fullScaleA * 0.002;
    return {
      leg,
      name: leg === null ? "Shunt" : `Shunt ${leg}`,
      senseV,
      across: acrossText(senseV),
      currentA,
      flow: isIdle ? "no current" : `${fixed(Math.abs(currentA), 2)} A ${FLOW_WORDS[site][currentA > 0 ? 0 : 1]}`,
      outputName: leg === null ? "output" : `output ${leg}`,
      output: outV === null ? null : `${fixed(outV, 3)} V`,
      limit: outV === null ? "" : limitWord(outV, facts).replace("at midscale", ""),
    };
  };
  if (site === "legTop") return [entry("A", reading.topAA, reading.senseAV, reading.outAV), entry("B", reading.topBA, reading.senseBV ?? 0, reading.outBV)];
  if (site === "legBottom") return [entry("A", reading.bottomAA, reading.senseAV, reading.outAV), entry("B", reading.bottomBA, reading.senseBV ?? 0, reading.outBV)];
  return [entry(null, site === "line" ? reading.motorCurrentA : reading.bridgeA, reading.senseAV, reading.outAV ?? null)];
}
