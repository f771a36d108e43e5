/** The power stage at one instant: model.md section 1 with D-14, D-15, D-29, D-36, D-43, D-45. Plain formulas, no solver. */

export type Condition = "highChannel" | "lowChannel" | "highDiode" | "lowDiode" | "open" | "through";
export type Gates = { high: boolean; low: boolean };
type Pair = [number, number];

export type StageParameters = {
  sourceV: number;
  sourceOhm: number;
  busF: number;
  acceptsReturn: boolean;
  high: { onOhm: number; diodeV: number; diodeOhm: number };
  low: { onOhm: number; diodeV: number; diodeOhm: number };
  topOhm: Pair;
  bottomOhm: Pair;
  lineOhm: number;
  supplyOhm: number;
  returnOhm: number;
  loadKind: "motor" | "inductive" | "resistive";
  windingOhm: number;
  inductanceH: number;
  torqueNmPerA: number;
  emfVs: number;
  isWindingOpen: boolean;
};

export type Electric = {
  currentA: number;
  busV: number;
  railV: number;
  groundV: number;
  terminalV: Pair;
  topA: Pair;
  bottomA: Pair;
  bridgeA: number;
  supplyA: number;
  /** Motor current slope, A/s. */
  currentSlope: number;
  /** Bus capacitor slope, V/s. */
  busSlope: number;
  switchesW: number;
};

export const isStiff = (p: StageParameters): boolean => p.sourceOhm === 0;
export const isCapacitive = (p: StageParameters): boolean => p.busF > 0 && p.sourceOhm > 0;
const isUpper = (condition: Condition): boolean => condition === "highChannel" || condition === "highDiode";
const isLower = (condition: Condition): boolean => condition === "lowChannel" || condition === "lowDiode";

/** Upper rail currents of both legs. A leg in shoot-through divides the current by its resistances (D-36). */
const solveTops = (p: StageParameters, legs: readonly Condition[], out: Pair, busV: number): Pair => {
  const driveV = isCapacitive(p) ? busV : p.sourceV;
  const commonOhm = (isCapacitive(p) ? 0 : p.sourceOhm) + p.supplyOhm + p.returnOhm;
  const top: Pair = [0, 0];
  const through: (0 | 1)[] = [];
  for (const x of [0, 1] as const) {
    if (isUpper(legs[x] ?? "open")) top[x] = out[x];
    if (legs[x] === "through") through.push(x);
  }
  if (through.length === 0) return top;
  const upper = (x: 0 | 1): number => p.high.onOhm + p.topOhm[x];
  const lower = (x: 0 | 1): number => p.low.onOhm + p.bottomOhm[x];
  const known = top[0] + top[1];
  // (R_u + R_l) i_x + R_common sum(i) = v_drive - R_common known + R_l i_out
  const right = (x: 0 | 1): number => driveV - commonOhm * known + lower(x) * out[x];
  const own = (x: 0 | 1): number => upper(x) + lower(x);
  const [first, second] = through;
  if (first !== undefined && second === undefined) top[first] = right(first) / (own(first) + commonOhm);
  if (first !== undefined && second !== undefined) {
    const a = own(0) + commonOhm;
    const d = own(1) + commonOhm;
    const determinant = a * d - commonOhm * commonOhm;
    top[0] = (right(0) * d - commonOhm * right(1)) / determinant;
    top[1] = (a * right(1) - commonOhm * right(0)) / determinant;
  }
  return top;
};

const legVoltage = (p: StageParameters, condition: Condition, x: 0 | 1, out: number, top: number, railV: number, groundV: number): number => {
  switch (condition) {
    case "highChannel":
      return railV - (p.high.onOhm + p.topOhm[x]) * out;
    case "lowChannel":
      return groundV - (p.low.onOhm + p.bottomOhm[x]) * out;
    case "highDiode":
      return railV + p.high.diodeV - (p.high.diodeOhm + p.topOhm[x]) * out;
    case "lowDiode":
      return groundV - p.low.diodeV - (p.low.diodeOhm + p.bottomOhm[x]) * out;
    case "through":
      return railV - (p.high.onOhm + p.topOhm[x]) * top;
    case "open":
      return Number.NaN;
  }
};

const terminals = (p: StageParameters, legs: readonly Condition[], out: Pair, top: Pair, railV: number, groundV: number, emfV: number): Pair => {
  const a = legVoltage(p, legs[0] ?? "open", 0, out[0], top[0], railV, groundV);
  const b = legVoltage(p, legs[1] ?? "open", 1, out[1], top[1], railV, groundV);
  if (legs[0] === "open" && legs[1] === "open") {
    const middle = (railV + p.high.diodeV - p.low.diodeV) / 2;
    return [middle + emfV / 2, middle - emfV / 2];
  }
  if (legs[0] === "open") return [b + emfV, b];
  if (legs[1] === "open") return [a, a - emfV];
  return [a, b];
};

const switchLoss = (p: StageParameters, legs: readonly Condition[], top: Pair, bottom: Pair): number => {
  let lossW = 0;
  for (const x of [0, 1] as const) {
    const condition = legs[x];
    if (condition === "highChannel" || condition === "through") lossW += p.high.onOhm * top[x] ** 2;
    if (condition === "lowChannel" || condition === "through") lossW += p.low.onOhm * bottom[x] ** 2;
    if (condition === "highDiode") lossW += p.high.diodeOhm * top[x] ** 2 + p.high.diodeV * Math.abs(top[x]);
    if (condition === "lowDiode") lossW += p.low.diodeOhm * bottom[x] ** 2 + p.low.diodeV * Math.abs(bottom[x]);
  }
  return lossW;
};

const sourceCurrent = (p: StageParameters, busV: number, bridgeA: number): number => {
  if (!isCapacitive(p)) return bridgeA;
  const freeA = (p.sourceV - busV) / p.sourceOhm;
  return p.acceptsReturn ? freeA : Math.max(0, freeA);
};

const atCurrent = (p: StageParameters, legs: readonly Condition[], currentA: number, speed: number, capacitorV: number): Electric => {
  const out: Pair = [currentA, -currentA];
  const top = solveTops(p, legs, out, capacitorV);
  const bottom: Pair = [0, 0];
  for (const x of [0, 1] as const) {
    if (isLower(legs[x] ?? "open")) bottom[x] = -out[x];
    if (legs[x] === "through") bottom[x] = top[x] - out[x];
  }
  const bridgeA = top[0] + top[1];
  const busV = isCapacitive(p) ? capacitorV : p.sourceV - p.sourceOhm * bridgeA;
  const railV = busV - p.supplyOhm * bridgeA;
  const groundV = p.returnOhm * bridgeA;
  const emfV = p.loadKind === "motor" ? p.emfVs * speed : 0;
  const terminalV = terminals(p, legs, out, top, railV, groundV, emfV);
  const isOpen = legs[0] === "open" || legs[1] === "open";
  const driveV = terminalV[0] - terminalV[1] - (p.windingOhm + p.lineOhm) * currentA - emfV;
  const supplyA = sourceCurrent(p, busV, bridgeA);
  return {
    currentA,
    busV,
    railV,
    groundV,
    terminalV,
    topA: top,
    bottomA: bottom,
    bridgeA,
    supplyA,
    currentSlope: isOpen || p.loadKind === "resistive" ? 0 : driveV / p.inductanceH,
    busSlope: isCapacitive(p) ? (supplyA - bridgeA) / p.busF : 0,
    switchesW: switchLoss(p, legs, top, bottom),
  };
};

/** Everything electric at one instant. A resistive load has no state: its current follows from the voltages (D-29). */
export const evaluateStage = (p: StageParameters, legs: readonly Condition[], currentA: number, speed: number, capacitorV: number): Electric => {
  if (p.loadKind !== "resistive") return atCurrent(p, legs, currentA, speed, capacitorV);
  if (legs[0] === "open" || legs[1] === "open") return atCurrent(p, legs, 0, 0, capacitorV);
  const mismatch = (a: number): number => {
    const at = atCurrent(p, legs, a, 0, capacitorV);
    return at.terminalV[0] - at.terminalV[1] - (p.windingOhm + p.lineOhm) * a;
  };
  const zero = mismatch(0);
  return atCurrent(p, legs, zero / (zero - mismatch(1)), 0, capacitorV);
};

/** Driving voltage of sign s at i = 0 with the off legs on the diodes that s would use (D-43); > 0 starts the current. */
export const startVoltage = (p: StageParameters, gates: readonly Gates[], s: 1 | -1, speed: number, capacitorV: number): number => {
  const legs = gates.map((gate, x) => channelOf(gate) ?? ((x === 0) === s > 0 ? "lowDiode" : "highDiode"));
  const at = atCurrent(p, legs, 0, speed, capacitorV);
  return s * (at.terminalV[0] - at.terminalV[1] - (p.loadKind === "motor" ? p.emfVs * speed : 0));
};

const channelOf = (gate: Gates): Condition | null =>
  gate.high && gate.low ? "through" : gate.high ? "highChannel" : gate.low ? "lowChannel" : null;

/** The conduction state of both legs from the gates and the state reached. */
export const resolveLegs = (p: StageParameters, gates: readonly Gates[], currentA: number, speed: number, capacitorV: number): [Condition, Condition] => {
  if (p.isWindingOpen) return ["open", "open"];
  const channels = gates.map(channelOf);
  const hasOff = channels.includes(null);
  const pick = (whenOff: (x: number) => Condition): [Condition, Condition] => [channels[0] ?? whenOff(0), channels[1] ?? whenOff(1)];
  if (!hasOff || p.loadKind === "resistive") return pick(() => "open");
  const diode = (s: number) => (x: number): Condition => ((x === 0) === s > 0 ? "lowDiode" : "highDiode");
  if (currentA !== 0) return pick(diode(Math.sign(currentA)));
  for (const s of [1, -1] as const) if (startVoltage(p, gates, s, speed, capacitorV) > 0) return pick(diode(s));
  return pick(() => "open");
};
