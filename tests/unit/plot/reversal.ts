import { createRun, type InstantReading, type Simulation, type View } from "@/lib/engine";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { baseDocument } from "../../support/oracle/base-document";

type Site = ScenarioDocument["sensing"]["site"];

/** A small motor turned round at 200 µs, 12 PWM periods: it drives, returns current to the supply, crosses zero and drives in reverse. */
export function reversalDocument(site: Site = "legTop"): ScenarioDocument {
  const document = baseDocument();
  const isLeg = site === "legTop" || site === "legBottom";
  document.supply.voltageV = 24;
  document.pwm.frequencyHz = 20000;
  document.pwm.alignment = "centre";
  document.bridge.deadTimeS = 1e-6;
  document.command.points = [
    { timeS: 0, duty: 0.55, ramp: "step" },
    { timeS: 2e-4, duty: -0.35, ramp: "step" },
  ];
  if (document.load.kind === "motor") {
    document.load.motor.resistanceOhm = 2.2;
    document.load.motor.inductanceH = 4e-4;
    document.load.motor.temperatureC = 20;
  }
  document.sensing.site = site;
  document.sensing.shunt.resistanceOhm = 0.01;
  document.sensing.amplifier.arrangement = isLeg ? "combinedMidscale" : "bipolarMidscale";
  document.sensing.amplifier.response = isLeg ? "unipolar" : "bipolar";
  document.sensing.amplifier.gain = { fixed: 25 };
  document.sensing.amplifier.outputMinV = 0.02;
  document.sensing.amplifier.outputMaxV = 3.28;
  document.sensing.reference = { voltageV: 1.65, tolerancePct: 0, tempcoPpmPerK: 0, sampledByConverter: false };
  document.sensing.converter = { ...document.sensing.converter, bits: 12, fullScaleV: 3.3, phase: 0.5 };
  document.initial = { currentA: 5.1, speedRadPerS: 40 };
  document.run = { durationS: 6e-4 };
  return document;
}

export type RunOf = { document: ScenarioDocument; simulation: Simulation; view: View; overview: View; readAt: (timeS: number) => InstantReading };

/** The real engine's run of a document, as the page gets it from the worker. */
export function runOf(document: ScenarioDocument, columnCount = 1200): RunOf {
  const run = createRun(document);
  while (!run.advance(4096)) continue;
  const simulation = run.finish();
  const whole = { fromS: 0, toS: document.run.durationS };
  return {
    document,
    simulation,
    view: run.view({ ...whole, columnCount }),
    overview: run.view({ ...whole, columnCount: 600 }),
    readAt: (timeS) => run.readAt([timeS])[0]!,
  };
}
