import type { Band, Conversion, InstantReading, TraceName } from "@/lib/engine/results";
import { CONDUCTION_SHORT } from "./bands";
import { isMiss } from "./draw-reading";
import type { PlacedLane } from "./layout";
import type { SensingFacts } from "./sensing-facts";
import { fixed, unitScale } from "./ticks";

export type ReadoutRow = { label: string; text: string; isFault?: boolean };

/** What the readout column is written from: everything known of the cursor's instant. */
export type CursorFacts = {
  /** Exact values of waveforms at the cursor; `null` where the run has none or they are not known yet. */
  valueOf: (name: TraceName) => number | null;
  reading: InstantReading | null;
  band: Band | null;
  /** Last conversion not after the cursor, and its number from 1. */
  sample: { conversion: Conversion; number: number } | null;
  pinMotorA: number | null;
};

/** Three significant digits at the lane's own scale, so that digits do not dance while the cursor moves. */
export function laneNumber(lane: { scale: { min: number; max: number }; unit: string }, isSigned: boolean): (value: number | null) => string {
  const largest = Math.max(Math.abs(lane.scale.min), Math.abs(lane.scale.max));
  const { factor, unit } = unitScale(largest, lane.unit);
  const digits = Math.max(0, Math.min(3, 2 - Math.floor(Math.log10(Math.max(largest / factor, 1e-9)))));
  const least = factor !== 1 ? 0 : lane.unit === "V" && largest < 20 ? 3 : lane.unit === "A" ? 2 : 0;
  const decimals = Math.max(digits, least);
  return (value) => (value === null ? "–" : `${fixed(value / factor, decimals, isSigned)} ${unit}`);
}

function gateRows(facts: CursorFacts): ReadoutRow[] {
  const gates = facts.band?.gates;
  const names = gates === undefined ? [] : [gates.highA && "AH", gates.lowA && "AL", gates.highB && "BH", gates.lowB && "BL"].filter(Boolean);
  const duty = facts.reading === null ? "–" : `${fixed(facts.reading.dutyCommand * 100, 1, true)} %`;
  return [
    { label: "on", text: gates === undefined ? "–" : names.length === 0 ? "none" : names.join(" + ") },
    { label: "duty", text: duty },
  ];
}

function motorRows(lane: PlacedLane, facts: CursorFacts, sensing: SensingFacts): ReadoutRow[] {
  const write = laneNumber(lane, true);
  const motorA = facts.valueOf("motorCurrentA");
  const rows: ReadoutRow[] = [{ label: "true", text: write(motorA) }];
  if (facts.sample !== null) {
    const { conversion, number } = facts.sample;
    const isFault = isMiss(conversion, sensing.sampleLimitA);
    rows.push({ label: `sample ${number}`, text: write(conversion.reconstructedA) });
    rows.push({ label: "its error", text: write(conversion.reconstructedA - conversion.trueA), isFault });
  }
  if (facts.pinMotorA !== null && motorA !== null) rows.push({ label: "P to cursor", text: write(motorA - facts.pinMotorA) });
  return rows;
}

function shuntRows(lane: PlacedLane, facts: CursorFacts): ReadoutRow[] {
  const name = lane.traces[0]?.name;
  const current = name === undefined ? null : facts.valueOf(name);
  const senseV = facts.valueOf(lane.id === "shuntB" ? "senseBV" : "senseAV");
  const { factor, unit } = unitScale(senseV === null ? 0 : Math.max(Math.abs(senseV), 1e-3), "V");
  return [
    { label: "current", text: laneNumber(lane, true)(current) },
    { label: "across", text: senseV === null ? "–" : `${fixed(senseV / factor, factor === 1 ? 3 : 1, true)} ${unit}` },
  ];
}

function outputRows(lane: PlacedLane, facts: CursorFacts, sensing: SensingFacts): ReadoutRow[] {
  const write = laneNumber(lane, false);
  if (!sensing.isLegSite) return [{ label: "output", text: write(facts.valueOf("outAV")) }];
  return [
    { label: "output A", text: write(facts.valueOf("outAV")) },
    { label: "output B", text: write(facts.valueOf("outBV")) },
    { label: sensing.differenceLabel, text: write(facts.valueOf("differenceV")) },
  ];
}

function readingRows(lane: PlacedLane, facts: CursorFacts, sensing: SensingFacts): ReadoutRow[] {
  const write = laneNumber(lane, false);
  const idealV = facts.valueOf("idealV");
  const value = facts.valueOf(lane.traces[0]!.name);
  const isWrong = idealV !== null && value !== null && Math.abs(idealV - value) > sensing.sampleLimitA * sensing.gainRatio * sensing.shuntOhm;
  const rows: ReadoutRow[] = [{ label: lane.label.toLowerCase(), text: write(value), isFault: isWrong }];
  if (idealV !== null) rows.push({ label: "should read", text: write(idealV) });
  if (facts.sample !== null) rows.push({ label: "ADC code", text: fixed(facts.sample.conversion.code, 0) });
  return rows;
}

/** Rows of one lane at the cursor. */
export function readoutRows(lane: PlacedLane, facts: CursorFacts, sensing: SensingFacts): ReadoutRow[] {
  if (lane.kind === "strip") return [{ label: "", text: facts.band === null ? "–" : CONDUCTION_SHORT[facts.band.conduction] }];
  if (lane.kind === "gates") return gateRows(facts);
  if (lane.id === "motor") return motorRows(lane, facts, sensing);
  if (lane.isReading) return readingRows(lane, facts, sensing);
  if (lane.id === "shuntA" || lane.id === "shuntB") return shuntRows(lane, facts);
  if (lane.id === "outputs") return outputRows(lane, facts, sensing);
  const write = laneNumber(lane, lane.kind === "signed");
  return lane.traces.map((trace) => ({ label: trace.label === "" ? lane.label.toLowerCase() : `terminal ${trace.label}`, text: write(facts.valueOf(trace.name)) }));
}
