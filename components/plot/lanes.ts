import type { TraceName, View } from "@/lib/engine/results";
import type { SensingFacts } from "./sensing-facts";

export const LANE_IDS = ["conduction", "gates", "motor", "speed", "bus", "terminals", "shuntA", "shuntB", "outputs", "difference", "combined"] as const;
export type LaneId = (typeof LANE_IDS)[number];

export type LaneTrace = { name: TraceName; label: string; isDashed: boolean };
export type Lane = {
  id: LaneId;
  /** `signed`: area from `base`, coloured by the direction of the motor current. `lines`: ink lines, A solid and B dashed. */
  kind: "strip" | "gates" | "signed" | "lines";
  label: string;
  sublabel: string;
  unit: string;
  traces: LaneTrace[];
  base: number | null;
  nominalPx: number;
  /** The lane of what the converter reads: dotted ideal line, hatch of what is not seen, samples with their codes. */
  isReading: boolean;
};

const line = (name: TraceName, label = "", isDashed = false): LaneTrace => ({ name, label, isDashed });

function shuntLanes(facts: SensingFacts): Lane[] {
  const shared = { kind: "signed" as const, unit: "A", base: 0, nominalPx: 46, isReading: false };
  if (!facts.isLegSite) {
    const name = facts.site === "line" ? "motorCurrentA" : "bridgeA";
    return [{ ...shared, id: "shuntA", label: "Shunt", sublabel: "current", traces: [line(name)] }];
  }
  const isTop = facts.site === "legTop";
  return [
    { ...shared, id: "shuntA", label: "Shunt A", sublabel: "current", traces: [line(isTop ? "topAA" : "bottomAA")] },
    { ...shared, id: "shuntB", label: "Shunt B", sublabel: "current", traces: [line(isTop ? "topBA" : "bottomBA")] },
  ];
}

function outputLanes(facts: SensingFacts): Lane[] {
  const { isLegSite, readingTrace } = facts;
  return [
    {
      id: "outputs",
      kind: "lines",
      label: isLegSite ? "Outputs" : "Output",
      sublabel: "",
      unit: "V",
      traces: isLegSite ? [line("outAV", "A"), line("outBV", "B", true)] : [line("outAV")],
      base: 0,
      nominalPx: readingTrace === "outAV" ? 84 : 46,
      isReading: readingTrace === "outAV",
    },
    {
      id: "difference",
      kind: "signed",
      label: "Difference",
      sublabel: facts.differenceLabel,
      unit: "V",
      traces: [line("differenceV")],
      base: 0,
      nominalPx: readingTrace === "differenceV" ? 84 : 46,
      isReading: readingTrace === "differenceV",
    },
    {
      id: "combined",
      kind: "signed",
      label: isLegSite ? "Combined" : "Output",
      sublabel: isLegSite ? "+ difference" : "around midscale",
      unit: "V",
      traces: [line("combinedV")],
      base: facts.referenceV,
      nominalPx: 84,
      isReading: readingTrace === "combinedV",
    },
  ];
}

/** Every lane this document can show, in the order of the plot. */
export function allLanes(facts: SensingFacts): Lane[] {
  const plain = { kind: "lines" as const, sublabel: "", base: 0, nominalPx: 42, isReading: false };
  return [
    { ...plain, id: "conduction", kind: "strip", label: "Conduction", unit: "", traces: [], base: null, nominalPx: 15 },
    { ...plain, id: "gates", kind: "gates", label: "Gates", unit: "", traces: [], base: null, nominalPx: 44 },
    { ...plain, id: "motor", kind: "signed", label: facts.loadName, sublabel: "current", unit: "A", traces: [line("motorCurrentA")], nominalPx: 94 },
    { ...plain, id: "speed", kind: "signed", label: "Speed", sublabel: "of the shaft", unit: "rad/s", traces: [line("speedRadPerS")] },
    { ...plain, id: "bus", label: "Bus", sublabel: "voltage", unit: "V", traces: [line("busV")], base: null },
    { ...plain, id: "terminals", label: "Terminals", unit: "V", traces: [line("terminalAV", "A"), line("terminalBV", "B", true)] },
    ...shuntLanes(facts),
    ...outputLanes(facts),
  ];
}

const hasTraces = (lane: Lane, view: View): boolean => lane.traces.length === 0 || lane.traces.some((trace) => view.traces[trace.name] !== undefined);

/** Lanes whose waveforms the view has. */
export const availableLanes = (facts: SensingFacts, view: View): Lane[] => allLanes(facts).filter((lane) => hasTraces(lane, view));

/** What is shown before anyone chooses: on a phone the conduction, the motor and the reading only. */
export function defaultLaneIds(facts: SensingFacts, isCompact: boolean): LaneId[] {
  const reading: LaneId = facts.readingTrace === "combinedV" ? "combined" : facts.readingTrace === "differenceV" ? "difference" : "outputs";
  if (isCompact) return ["conduction", "motor", reading];
  const shown: LaneId[] = ["conduction", "gates", "motor", "shuntA", "shuntB", "outputs", reading];
  return LANE_IDS.filter((id) => shown.includes(id));
}
