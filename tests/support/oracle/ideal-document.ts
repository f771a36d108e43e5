import type { ScenarioDocument } from "@/lib/scenario/schema";
import { baseDocument } from "./base-document";

/**
 * Textbook circuit as a document: lossless switches and diodes, no dead time, one line shunt of 1 micro-ohm that is
 * taken off the load's resistance, so that the loop resistance is exactly the textbook's.
 */
export const LINE_OHM = 1e-6;

export type IdealDrive = {
  voltageV: number;
  frequencyHz: number;
  duty: number;
  durationS: number;
  scheme?: ScenarioDocument["pwm"]["scheme"];
  synchronous?: boolean;
  currentA?: number;
  speedRadPerS?: number;
  windowPeriods?: [number, number];
};

export type IdealMotor = { ohm: number; henry: number; torqueNmPerA: number; emfVs?: number; inertia: number; viscous?: number; locked?: boolean; activeNm?: number };

const idealDrive = (drive: IdealDrive): ScenarioDocument => {
  const document = baseDocument();
  const side = { onResistanceOhm: 0, diodeForwardV: 0, diodeResistanceOhm: 0 };
  document.supply = { voltageV: drive.voltageV, resistanceOhm: 0, busCapacitanceF: 0, acceptsReturn: true };
  document.bridge = { highSide: { ...side }, lowSide: { ...side }, deadTimeS: 0, commutationS: 0 };
  document.pwm = { frequencyHz: drive.frequencyHz, alignment: "edge", scheme: drive.scheme ?? "lowSideRecirculation", synchronous: drive.synchronous ?? true };
  document.command.points = [{ timeS: 0, duty: drive.duty, ramp: "step" }];
  document.sensing.site = "line";
  document.sensing.shunt.resistanceOhm = LINE_OHM;
  document.sensing.amplifier.arrangement = "singleEnded";
  document.sensing.amplifier.response = "bipolar";
  document.sensing.amplifier.offsetV = 0;
  document.sensing.amplifier.cmrrDb = 160;
  document.sensing.amplifier.outputMinV = -3.2;
  // Slow enough that the step-by-step reference can run these documents too.
  document.sensing.amplifier.bandwidthHz = drive.frequencyHz;
  delete document.sensing.filter;
  document.initial = { currentA: drive.currentA ?? 0, speedRadPerS: drive.speedRadPerS ?? 0 };
  document.run = { durationS: drive.durationS };
  if (drive.windowPeriods) {
    const [from, to] = drive.windowPeriods;
    document.run.window = { fromS: from / drive.frequencyHz, toS: to / drive.frequencyHz };
  }
  return document;
};

export const idealMotorDocument = (drive: IdealDrive, motor: IdealMotor): ScenarioDocument => {
  const document = idealDrive(drive);
  document.load = {
    kind: "motor",
    motor: {
      resistanceOhm: motor.ohm - LINE_OHM,
      inductanceH: motor.henry,
      torqueConstantNmPerA: motor.torqueNmPerA,
      backEmfVPerRadPerS: motor.emfVs ?? motor.torqueNmPerA,
      inertiaKgM2: motor.inertia,
      viscousNmPerRadPerS: motor.viscous ?? 0,
      coulombNm: 0,
      staticNm: 0,
      temperatureC: 20,
      locked: motor.locked ?? false,
    },
    shaft: motor.activeNm === undefined ? [] : [{ timeS: 0, kind: "active", value: motor.activeNm }],
  };
  return document;
};

/** A back-EMF that stays put: a rotor too heavy for its speed to change within the run (relative change under 1e-9). */
export const emfDocument = (drive: IdealDrive, ohm: number, henry: number, emfV: number): ScenarioDocument =>
  idealMotorDocument({ ...drive, speedRadPerS: 1000 }, { ohm, henry, torqueNmPerA: emfV / 1000, inertia: 1e4 });

export const inductiveDocument = (drive: IdealDrive, ohm: number, henry: number): ScenarioDocument => {
  const document = idealDrive(drive);
  document.load = { kind: "inductive", resistanceOhm: ohm - LINE_OHM, inductanceH: henry };
  return document;
};
