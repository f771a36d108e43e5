import { ROW_CURRENT, rowAt, type AffineMode } from "../model/affine";
import { ConductionResolver } from "../model/conduction";
import { LEG_OPEN, LEG_STATE_COUNT } from "../model/legs";
import type { StageParameters } from "../model/parameters";
import { ModeSlot, RING } from "./mode-slot";
import { buildOperator, OPERATOR_LENGTH, type Poles } from "./operator";
import { PIECE_LENGTH, PIECE_START } from "./piece";
import { holdMaxNm, holdMinNm, STAGE_BREAK_FORWARD, STAGE_BREAK_REVERSE, STAGE_DIODE_ENDS, STAGE_DIODE_STARTS, STAGE_NO_EVENT, STAGE_SHAFT_ZERO, STAGE_SOURCE, StageGuards } from "./stage-guards";

const RISING_FRICTION_ERROR = 1e-8;
const ARC_RAD = 1;

/**
 * The power stage between switching instants: state, conduction mode, exact propagation, its own events.
 * x = [motor current A, speed rad/s, bus voltage V]. The caller sets gates and parameters, asks for the next event inside
 * an interval, commits, and applies the event. Tangent touches of a guard are not events (see firstDownCrossing).
 */
export class PowerStage {
  readonly x = new Float64Array(3);
  readonly xEnd = new Float64Array(3);
  /** The piece being tried: start, length, first event of the stage and of its rider, s. */
  readonly piece = new Float64Array(4);
  /** Operator of the piece tried last. */
  stepOperator: Float64Array = new Float64Array(OPERATOR_LENGTH);
  parameters!: StageParameters;
  slot!: ModeSlot;
  gateA = 0;
  gateB = 0;
  shaftSign = 0;
  sourceConducts = true;
  /** Coulomb friction that acts in the present piece, N m. */
  coulombNm = 0;
  /** Rises with every change of parameters: modes filled before are stale. */
  version = 0;
  /** Rises with every refill of a mode, so that what others derive from it can be kept beside it. */
  fills = 0;
  eventKind = STAGE_NO_EVENT;
  /** Guards that stand at their limit are let pass: set while events follow each other without time moving on. */
  skipsIdle = false;
  operatorBuilds = 0;
  crossings = 0;

  private readonly slots: (ModeSlot | undefined)[] = new Array(LEG_STATE_COUNT * LEG_STATE_COUNT * 6);
  readonly resolver = new ConductionResolver();
  private readonly startGuard = new Float64Array(4);
  private readonly guards = new StageGuards(this);

  constructor(private readonly poles: Poles) {}

  get mode(): AffineMode {
    return this.slot.mode;
  }

  setParameters(parameters: StageParameters): void {
    this.parameters = parameters;
    this.coulombNm = parameters.coulombNm;
    this.version++;
    if (!parameters.hasBusState) this.x[2] = parameters.sourceV;
    if (parameters.isLocked) {
      this.x[1] = 0;
      this.shaftSign = 0;
    }
  }

  /** Decides about a shaft at w = 0: stays, or turns the way it is driven. Returns true if it sticks. */
  settleShaft(): boolean {
    const p = this.parameters;
    if (p.isLocked) {
      this.shaftSign = 0;
      return true;
    }
    const torqueNm = p.torqueNmPerA * this.x[0]!;
    const maxNm = holdMaxNm(p);
    const minNm = holdMinNm(p);
    if (maxNm > minNm && torqueNm <= maxNm && torqueNm >= minNm) {
      this.shaftSign = 0;
      return true;
    }
    this.shaftSign = torqueNm > maxNm || (maxNm <= minNm && torqueNm >= maxNm) ? 1 : -1;
    return false;
  }

  /** Starts the state: shaft and source from the initial values, then the conduction state. */
  begin(currentA: number, speedRadPerS: number, busV: number): void {
    this.x[0] = currentA;
    this.x[1] = speedRadPerS;
    this.x[2] = busV;
    if (speedRadPerS !== 0) this.shaftSign = Math.sign(speedRadPerS);
    else this.settleShaft();
    this.sourceConducts = this.parameters.acceptsReturn || busV <= this.parameters.sourceV;
    this.resolve();
  }

  /**
   * Finds the conduction state from gates and state, and enters its mode.
   * Returns true if the current was cut to zero by an interruption (open winding, open shunt).
   */
  resolve(): boolean {
    const { x, parameters: p } = this;
    const found = this.resolver.resolve(p, this.gateA, this.gateB, x[0]!, x[1]!, x[2]!);
    const { legA, legB, isCut } = found;
    if (isCut || legA === LEG_OPEN || legB === LEG_OPEN) x[0] = 0;
    this.enter(legA, legB);
    return isCut;
  }

  /** Goes back into a mode whose legs are known (from a checkpoint). */
  reenter(legA: number, legB: number): void {
    this.enter(legA, legB);
  }

  private enter(legA: number, legB: number): void {
    const key = ((legA * LEG_STATE_COUNT + legB) * 3 + this.shaftSign + 1) * 2 + (this.sourceConducts ? 1 : 0);
    let slot = this.slots[key];
    if (!slot) slot = this.slots[key] = new ModeSlot();
    this.slot = slot;
    if (slot.version !== this.version) {
      slot.mode.legA = legA;
      slot.mode.legB = legB;
      slot.mode.shaftSign = this.shaftSign;
      slot.mode.sourceConducts = this.sourceConducts;
      this.fill(slot, this.x[1]!);
    }
    if (slot.mode.isCurrentAlgebraic) this.x[0] = rowAt(slot.mode.rows, ROW_CURRENT, this.x);
  }

  private fill(slot: ModeSlot, tangentSpeedRadPerS: number): void {
    slot.version = this.version;
    this.fills++;
    slot.fill(this.parameters, tangentSpeedRadPerS);
  }

  /**
   * Shortens the piece to what may be taken as affine: less only for fan loads (tangent) and rising friction (its middle
   * value). Refills the mode where its tangent is off.
   * @param changedAtS when the parameters were set
   */
  prepare(changedAtS: number, periodS: number): void {
    const p = this.parameters;
    if (this.slot.spectrum.oscillationPerS > 0) this.limitToArc();
    if (p.coulombRateNmPerS === 0 && p.fanNmPerRadPerS2 === 0) return;
    const h = this.piece[PIECE_LENGTH]!;
    const sinceChangeS = this.piece[PIECE_START]! - changedAtS;
    let stretchS = h;
    if (p.coulombRateNmPerS !== 0 && this.shaftSign !== 0) {
      // the middle value is off by rate h^2/(8 J) in speed at most: held to 1e-8 of the speed
      const speed = Math.max(Math.abs(this.x[1]!), 1e-2);
      const longestS = Math.sqrt((8 * p.inertiaKgM2 * RISING_FRICTION_ERROR * speed) / Math.abs(p.coulombRateNmPerS));
      stretchS = Math.min(stretchS, Math.max(longestS, periodS / 1024));
      this.version++;
      this.coulombNm = p.coulombNm + p.coulombRateNmPerS * (sinceChangeS + 0.5 * stretchS);
      this.parameters = { ...p, coulombNm: this.coulombNm };
      this.enter(this.mode.legA, this.mode.legB);
      this.parameters = p;
      this.piece[PIECE_LENGTH] = stretchS;
      return;
    }
    if (p.fanNmPerRadPerS2 > 0 && this.shaftSign !== 0) {
      const speed = this.x[1]!;
      const accel = this.fanAcceleration(speed);
      // the tangent's torque error averages k dw^2/12: 4e-4 of the speed leaves 1.3e-8 of the torque
      const changeMax = 4e-4 * Math.max(Math.abs(speed), 1e-2);
      if (Math.abs(accel) * stretchS > changeMax) stretchS = Math.max(changeMax / Math.abs(accel), h / 256);
      const halfChange = 0.5 * accel * stretchS;
      const middle = speed + Math.sign(halfChange) * Math.min(Math.abs(halfChange), Math.max(Math.abs(speed), 1));
      if (Math.abs(middle - this.slot.tangentSpeedRadPerS) > 1e-6 * Math.abs(middle) + 1e-9) {
        this.slot.version = ++this.version;
        this.fill(this.slot, middle);
      }
      this.piece[PIECE_LENGTH] = stretchS;
    }
  }

  /** dw/dt from the torques themselves, not from a tangent taken elsewhere. */
  private fanAcceleration(speed: number): number {
    const p = this.parameters;
    const activeNm = p.activeOpposingNm * this.shaftSign > 0 ? p.activeOpposingNm : p.activeDrivingNm;
    const frictionNm = this.shaftSign * (this.coulombNm + p.constantNm) + p.viscousNmPerRadPerS * speed + p.fanNmPerRadPerS2 * speed * Math.abs(speed);
    return (p.torqueNmPerA * this.x[0]! - frictionNm - activeNm) / p.inertiaKgM2;
  }

  /** Keeps the piece below a sixth of a turn of an oscillating mode, so that no guard passes zero twice between its ends. */
  private limitToArc(): void {
    const arcS = ARC_RAD / this.slot.spectrum.oscillationPerS;
    if (arcS < this.piece[PIECE_LENGTH]!) this.piece[PIECE_LENGTH] = arcS;
  }

  /** Works out xEnd for the length of the piece. */
  step(): void {
    const operator = this.operator(this.piece[PIECE_LENGTH]!);
    this.stepOperator = operator;
    this.apply(operator);
  }

  /** The operator of the present mode over h, from the mode's ring or built now. */
  operator(h: number): Float64Array {
    const { slot } = this;
    const { durations } = slot;
    for (let k = 0; k < RING; k++) if (durations[k] === h) return slot.operators[k]!;
    const k = slot.next;
    slot.next = k + 1 === RING ? 0 : k + 1;
    durations[k] = h;
    let operator = slot.operators[k];
    if (!operator) operator = slot.operators[k] = new Float64Array(OPERATOR_LENGTH);
    buildOperator(slot.mode, slot.spectrum, this.poles, h, operator);
    this.operatorBuilds++;
    return operator;
  }

  /** xEnd = state after the operator. */
  private apply(o: Float64Array): void {
    const { x, xEnd } = this;
    const x0 = x[0]!;
    const x1 = x[1]!;
    const x2 = x[2]!;
    xEnd[0] = o[0]! * x0 + o[1]! * x1 + o[2]! * x2 + o[3]!;
    xEnd[1] = o[4]! * x0 + o[5]! * x1 + o[6]! * x2 + o[7]!;
    xEnd[2] = o[8]! * x0 + o[9]! * x1 + o[10]! * x2 + o[11]!;
  }

  /** Takes over xEnd as the state. */
  commit(): void {
    this.x[0] = this.xEnd[0]!;
    this.x[1] = this.xEnd[1]!;
    this.x[2] = this.xEnd[2]!;
  }

  /** Finds the earliest event of the stage inside the piece, given xEnd; its kind is left in `eventKind`. */
  nextEvent(): boolean {
    return this.guards.nextEvent();
  }

  /** Pushes what must keep its sign for the piece tried last to stay free of stage events (both ends of it). */
  pushGuards(out: number[]): void {
    this.guards.pushGuards(out);
  }

  /** Puts the state on the far side of the event found last and enters the new mode. */
  applyEvent(): void {
    const { x } = this;
    switch (this.eventKind) {
      case STAGE_DIODE_ENDS:
        x[0] = 0;
        break;
      case STAGE_SHAFT_ZERO: {
        x[1] = 0;
        const before = this.shaftSign;
        if (!this.settleShaft()) this.shaftSign = -before; // goes through
        break;
      }
      case STAGE_BREAK_FORWARD:
        this.shaftSign = 1;
        break;
      case STAGE_BREAK_REVERSE:
        this.shaftSign = -1;
        break;
      case STAGE_SOURCE:
        this.sourceConducts = !this.sourceConducts;
        x[2] = this.parameters.sourceV;
        break;
      default: // STAGE_DIODE_STARTS: the resolution below finds the direction
        break;
    }
    if (this.eventKind === STAGE_DIODE_STARTS) this.startDiodes();
    else this.resolve();
  }

  /** At the located instant the start condition is at its limit; takes the side that the crossing says. */
  private startDiodes(): void {
    let sign = 1;
    let best = -Infinity;
    for (let s = 1; s >= -1; s -= 2) {
      if (!this.resolver.startRow(this.parameters, s, this.startGuard)) continue;
      const value = this.startGuard[1]! * this.x[1]! + this.startGuard[2]! * this.x[2]! + this.startGuard[3]!;
      if (value > best) {
        best = value;
        sign = s;
      }
    }
    this.resolver.startRow(this.parameters, sign, this.startGuard);
    this.enter(this.resolver.result.legA, this.resolver.result.legB);
  }
}
