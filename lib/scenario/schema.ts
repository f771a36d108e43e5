import { z } from "zod";
import type { Finding } from "@/lib/result";
import { findingsFrom, tooLarge } from "./findings";
import { LENGTHS } from "./ranges";
import { bridge, command, pwm, supply } from "./schema-drive";
import { FAULT_SCHEMAS } from "./schema-faults";
import { load } from "./schema-load";
import { quantity, text } from "./schema-parts";
import { sensing } from "./schema-sensing";
import { brokenRules } from "./rules";

/** The scenario document, format slackwater.scenario/1 (scenario.md, decisions.md). Cross-field rules are in rules.ts. */
export const SCENARIO_FORMAT = "slackwater.scenario/1";

export const scenarioSchema = z.strictObject({
  format: z.literal(SCENARIO_FORMAT),
  title: text("title"),
  notes: text("notes"),
  supply,
  bridge,
  pwm,
  command,
  load,
  sensing,
  faults: z.array(z.discriminatedUnion("kind", FAULT_SCHEMAS)).max(LENGTHS.faults[1]).default([]),
  initial: z.strictObject({
    currentA: quantity("initial.currentA").default(0),
    speedRadPerS: quantity("initial.speedRadPerS").default(0),
    busV: quantity("initial.busV").optional(),
  }),
  run: z.strictObject({
    durationS: quantity("run.durationS"),
    window: z.strictObject({ fromS: quantity("run.window.fromS"), toS: quantity("run.window.toS") }).optional(),
  }),
});

/** What may be sent: fields with a default may be left out. */
export type ScenarioInput = z.input<typeof scenarioSchema>;
/** Every default filled in. */
export type ScenarioDocument = z.output<typeof scenarioSchema>;

export type Supply = ScenarioDocument["supply"];
export type Bridge = ScenarioDocument["bridge"];
export type Pwm = ScenarioDocument["pwm"];
export type Scheme = Pwm["scheme"];
export type Command = ScenarioDocument["command"];
export type CommandPoint = Command["points"][number];
export type SpecialInterval = Command["special"][number];
export type Load = ScenarioDocument["load"];
export type MotorLoad = Extract<Load, { kind: "motor" }>;
export type Motor = MotorLoad["motor"];
export type ShaftEntry = MotorLoad["shaft"][number];
export type Sensing = ScenarioDocument["sensing"];
export type Site = Sensing["site"];
export type Shunt = Sensing["shunt"];
export type Amplifier = Sensing["amplifier"];
export type Arrangement = Amplifier["arrangement"];
export type Reference = NonNullable<Sensing["reference"]>;
export type Converter = Sensing["converter"];
export type Fault = ScenarioDocument["faults"][number];
export type FaultKind = Fault["kind"];

export type ParsedScenario = { ok: true; document: ScenarioDocument } | { ok: false; findings: Finding[] };

/**
 * Reads anything as a scenario. A refusal names every problem at once: shape, ranges, and the rules between fields as far
 * as the fields they need can be read. Never throws; oversized values are refused before they are walked in full.
 */
export function parseScenario(value: unknown): ParsedScenario {
  const oversized = tooLarge(value);
  if (oversized) return { ok: false, findings: [oversized] };
  const parsed = scenarioSchema.safeParse(value);
  const findings = parsed.success ? [] : findingsFrom(parsed.error.issues, value);
  for (const broken of brokenRules(value)) {
    if (!findings.some((finding) => finding.path === broken.path)) findings.push(broken);
  }
  if (!parsed.success || findings.length > 0) return { ok: false, findings };
  return { ok: true, document: parsed.data };
}

/** True for the sites that have a shunt in each leg. */
export const isLegSite = (site: Site): boolean => site === "legTop" || site === "legBottom";

/** The gain G of the amplifier in V/V. */
export const gainOf = (amplifierOfDocument: Amplifier): number =>
  "fixed" in amplifierOfDocument.gain
    ? amplifierOfDocument.gain.fixed
    : amplifierOfDocument.gain.outOhm / amplifierOfDocument.gain.inOhm;
