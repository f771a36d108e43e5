import { LEG_HIGH_CHANNEL, LEG_HIGH_DIODE, LEG_LOW_CHANNEL, LEG_LOW_DIODE, LEG_OPEN, LEG_THROUGH } from "./legs";
import type { StageParameters } from "./parameters";

/**
 * One conduction mode as an affine system dx/dt = A x + b over x = [i, w, v] (motor current, speed, bus voltage; v is
 * constant where the bus is algebraic), with every electrical quantity as a row [ci, cw, cv, c0] over [x, 1].
 */
export type AffineMode = {
  legA: number;
  legB: number;
  /** +1 / -1: turning that way; 0: stuck or locked. */
  shaftSign: number;
  sourceConducts: boolean;
  a: Float64Array; // 3 x 3, row major
  b: Float64Array; // 3
  rows: Float64Array; // ROW_COUNT x 4
  /** Resistive load: the current follows the voltages at once; it is set to this row on entering the mode. */
  isCurrentAlgebraic: boolean;
  isCurrentOpen: boolean;
};

export const ROW_TOP_A = 0;
export const ROW_TOP_B = 4;
export const ROW_BOTTOM_A = 8;
export const ROW_BOTTOM_B = 12;
export const ROW_BRIDGE = 16;
export const ROW_SUPPLY = 20;
export const ROW_BUS = 24;
export const ROW_RAIL = 28;
export const ROW_GROUND = 32;
export const ROW_TERMINAL_A = 36;
export const ROW_TERMINAL_B = 40;
export const ROW_CURRENT = 44;
export const ROW_LENGTH = 48;

/** Value of the row at `offset` for the state x. */
export function rowAt(rows: Float64Array, offset: number, x: Float64Array): number {
  return rows[offset]! * x[0]! + rows[offset + 1]! * x[1]! + rows[offset + 2]! * x[2]! + rows[offset + 3]!;
}

/** out = sa * row a + sb * row b (rows of 4). */
function combine(rows: Float64Array, out: number, a: number, sa: number, b: number, sb: number): void {
  for (let j = 0; j < 4; j++) rows[out + j] = sa * rows[a + j]! + sb * rows[b + j]!;
}

/**
 * A leg seen from rails and motor, with D = v_rail - v_ground:
 * i_top = g D + a i_out and v_terminal = v_ground + a D + e - rho i_out. Normal states have g = 0 and a = 1 or 0.
 */
type LegPort = { g: number; a: number; e: number; rho: number };

/** Keeps a bolted short from dividing by zero; far below any resistance that a document can state. */
const LEAST_THROUGH_OHM = 1e-12;

function legPort(p: StageParameters, leg: number, topOhm: number, bottomOhm: number): LegPort {
  switch (leg) {
    case LEG_HIGH_CHANNEL:
      return { g: 0, a: 1, e: 0, rho: p.highOnOhm + topOhm };
    case LEG_LOW_CHANNEL:
      return { g: 0, a: 0, e: 0, rho: p.lowOnOhm + bottomOhm };
    case LEG_HIGH_DIODE:
      return { g: 0, a: 1, e: p.highDiodeV, rho: p.highDiodeOhm + topOhm };
    case LEG_LOW_DIODE:
      return { g: 0, a: 0, e: -p.lowDiodeV, rho: p.lowDiodeOhm + bottomOhm };
    case LEG_THROUGH: {
      const upperOhm = p.highOnOhm + topOhm + LEAST_THROUGH_OHM / 2;
      const lowerOhm = p.lowOnOhm + bottomOhm + LEAST_THROUGH_OHM / 2;
      const sumOhm = upperOhm + lowerOhm;
      return { g: 1 / sumOhm, a: lowerOhm / sumOhm, e: 0, rho: (upperOhm * lowerOhm) / sumOhm };
    }
    default: // open
      return { g: 0, a: 0, e: 0, rho: 0 };
  }
}

/** Rows of rails, bridge and supply current, given both ports; the current row must be set. */
function fillRails(mode: AffineMode, p: StageParameters, portA: LegPort, portB: LegPort): void {
  const { rows } = mode;
  const g = portA.g + portB.g;
  const kappa = portA.a - portB.a;
  const shuntOhm = p.supplyShuntOhm + p.returnShuntOhm;
  // D = (v_bus - shunt kappa i) / (1 + shunt g), the source resistance counting as a shunt when the bus is algebraic
  const seriesOhm = p.hasBusState ? shuntOhm : shuntOhm + p.sourceOhm; // a stiff bus has no source resistance
  const scale = 1 / (1 + seriesOhm * g);
  const dI = -seriesOhm * kappa * scale;
  const dV = p.hasBusState ? scale : 0;
  const d0 = p.hasBusState ? 0 : p.sourceV * scale;
  const cI = rows[ROW_CURRENT]!; // 1, or 0 while the motor circuit is open
  rows.set([(g * dI + kappa) * cI, 0, g * dV, g * d0], ROW_BRIDGE);
  if (p.hasBusState) rows.set([0, 0, 1, 0], ROW_BUS);
  else {
    for (let j = 0; j < 4; j++) rows[ROW_BUS + j] = -p.sourceOhm * rows[ROW_BRIDGE + j]!;
    rows[ROW_BUS + 3]! += p.sourceV;
  }
  combine(rows, ROW_RAIL, ROW_BUS, 1, ROW_BRIDGE, -p.supplyShuntOhm);
  combine(rows, ROW_GROUND, ROW_BRIDGE, p.returnShuntOhm, ROW_BRIDGE, 0);
  if (!p.hasBusState) rows.copyWithin(ROW_SUPPLY, ROW_BRIDGE, ROW_BRIDGE + 4);
  else if (mode.sourceConducts) rows.set([0, 0, -1 / p.sourceOhm, p.sourceV / p.sourceOhm], ROW_SUPPLY);
  else rows.fill(0, ROW_SUPPLY, ROW_SUPPLY + 4);
}

/** Rows of one leg's terminal and rails; `sign` is +1 for leg A (i_out = i) and -1 for leg B. */
function fillLeg(rows: Float64Array, port: LegPort, sign: number, terminal: number, top: number, bottom: number): void {
  for (let j = 0; j < 4; j++) {
    const d = rows[ROW_RAIL + j]! - rows[ROW_GROUND + j]!;
    const out = sign * rows[ROW_CURRENT + j]!;
    rows[terminal + j] = rows[ROW_GROUND + j]! + port.a * d - port.rho * out + (j === 3 ? port.e : 0);
    rows[top + j] = port.g * d + port.a * out;
    rows[bottom + j] = rows[top + j]! - out; // Kirchhoff's law at the terminal
  }
}

/** Terminals while the motor circuit is open: D-15 (both legs open) and the table's last row (one leg open). */
function fillOpenTerminals(mode: AffineMode, p: StageParameters, emf: number): void {
  const { rows } = mode;
  if (mode.legA === LEG_OPEN && mode.legB === LEG_OPEN) {
    for (let j = 0; j < 4; j++) {
      const half = 0.5 * rows[ROW_BUS + j]! + (j === 3 ? 0.5 * (p.highDiodeV - p.lowDiodeV) : 0);
      rows[ROW_TERMINAL_A + j] = half + (j === 1 ? 0.5 * emf : 0);
      rows[ROW_TERMINAL_B + j] = half - (j === 1 ? 0.5 * emf : 0);
    }
  } else if (mode.legA === LEG_OPEN) {
    rows.copyWithin(ROW_TERMINAL_A, ROW_TERMINAL_B, ROW_TERMINAL_B + 4);
    rows[ROW_TERMINAL_A + 1]! += emf;
  } else if (mode.legB === LEG_OPEN) {
    rows.copyWithin(ROW_TERMINAL_B, ROW_TERMINAL_A, ROW_TERMINAL_A + 4);
    rows[ROW_TERMINAL_B + 1]! -= emf;
  }
}

function fillShaft(mode: AffineMode, p: StageParameters, tangentSpeedRadPerS: number): void {
  const { a, b, shaftSign } = mode;
  if (shaftSign === 0 || p.isLocked) return;
  const j = p.inertiaKgM2;
  const isOpposing = p.activeOpposingNm * shaftSign > 0;
  const activeNm = isOpposing ? p.activeOpposingNm : p.activeDrivingNm;
  const speed = Math.abs(tangentSpeedRadPerS);
  // fan torque k w|w|, by its tangent at the given speed: 2 k |w0| w - k w0 |w0|
  a[3] = p.torqueNmPerA / j;
  a[4] = -(p.viscousNmPerRadPerS + 2 * p.fanNmPerRadPerS2 * speed) / j;
  b[1] = (-shaftSign * (p.coulombNm + p.constantNm) - activeNm + p.fanNmPerRadPerS2 * speed * tangentSpeedRadPerS) / j;
}

/**
 * Fills A, b and the rows of a mode from the stage's constants.
 * Sources: model.md section 1 (table of conduction states) with D-14, D-15, D-29, D-30, D-36; Kirchhoff's laws.
 * @param tangentSpeedRadPerS speed at which a fan load is linearised; unused without one
 */
export function fillAffineMode(mode: AffineMode, p: StageParameters, tangentSpeedRadPerS: number): void {
  const { a, b, rows } = mode;
  a.fill(0);
  b.fill(0);
  rows.fill(0);
  const isOpen = mode.legA === LEG_OPEN || mode.legB === LEG_OPEN;
  mode.isCurrentOpen = isOpen;
  mode.isCurrentAlgebraic = p.isResistive && !isOpen;
  rows[ROW_CURRENT] = isOpen ? 0 : 1;
  const portA = legPort(p, mode.legA, p.topAOhm, p.bottomAOhm);
  const portB = legPort(p, mode.legB, p.topBOhm, p.bottomBOhm);
  fillRails(mode, p, portA, portB);
  fillLeg(rows, portA, 1, ROW_TERMINAL_A, ROW_TOP_A, ROW_BOTTOM_A);
  fillLeg(rows, portB, -1, ROW_TERMINAL_B, ROW_TOP_B, ROW_BOTTOM_B);
  if (isOpen) fillOpenTerminals(mode, p, p.backEmfVPerRadPerS);
  fillShaft(mode, p, tangentSpeedRadPerS);
  if (p.hasBusState) {
    for (let j = 0; j < 3; j++) a[6 + j] = (rows[ROW_SUPPLY + j]! - rows[ROW_BRIDGE + j]!) / p.busF;
    b[2] = (rows[ROW_SUPPLY + 3]! - rows[ROW_BRIDGE + 3]!) / p.busF;
  }
  if (isOpen) return;
  const loopOhm = p.windingOhm + p.lineOhm;
  if (mode.isCurrentAlgebraic) {
    // 0 = v_A - v_B - R i solved for i; its derivative follows the bus
    const own = loopOhm - (rows[ROW_TERMINAL_A]! - rows[ROW_TERMINAL_B]!);
    const fromBus = (rows[ROW_TERMINAL_A + 2]! - rows[ROW_TERMINAL_B + 2]!) / own;
    const constant = (rows[ROW_TERMINAL_A + 3]! - rows[ROW_TERMINAL_B + 3]!) / own;
    mode.rows.set([0, 0, fromBus, constant], ROW_CURRENT);
    for (let j = 0; j < 3; j++) a[j] = fromBus * a[6 + j]!;
    b[0] = fromBus * b[2]!;
    return;
  }
  for (let j = 0; j < 3; j++) a[j] = (rows[ROW_TERMINAL_A + j]! - rows[ROW_TERMINAL_B + j]!) / p.inductanceH;
  a[0]! -= loopOhm / p.inductanceH;
  a[1]! -= p.backEmfVPerRadPerS / p.inductanceH;
  b[0] = (rows[ROW_TERMINAL_A + 3]! - rows[ROW_TERMINAL_B + 3]!) / p.inductanceH;
}
