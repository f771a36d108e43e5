import type { ScenarioDocument } from "../../scenario/schema";
import { CommandPattern, DutyCommand, type CommandMemory } from "./command";
import { GateDriver, type GateEdge } from "./gates";

/** From the command to the gate edges of each period: duty, direction and dwell, pattern, dead time. */
export class GatePlan {
  /** Duty of the running period. */
  duty = 0;
  memory: CommandMemory = { direction: 1, dwellFromS: 0, dwellToS: 0 };
  readonly driver: GateDriver;
  private readonly command: DutyCommand;
  private readonly pattern: CommandPattern;
  private readonly periodS: number;
  private cachedBefore: number[] = [];
  private cachedDuty = NaN;
  private cachedDirection = 0;
  private cachedEdges: GateEdge[] = [];
  private cachedAfter: number[] = [];

  constructor(document: ScenarioDocument) {
    this.periodS = 1 / document.pwm.frequencyHz;
    this.command = new DutyCommand(document.command.points);
    this.pattern = new CommandPattern(document);
    this.driver = new GateDriver(document.bridge.deadTimeS);
  }

  dutyAt(timeS: number): number {
    return this.command.at(timeS);
  }

  /** Takes the duty of the period that starts at `startS`; true if it turns the bridge round. */
  beginPeriod(startS: number): boolean {
    this.duty = this.command.at(startS);
    return this.pattern.beginPeriod(this.memory, this.duty, startS);
  }

  /** Gate edges of this period, from the last one where nothing differs: bit-equal offsets make operators reusable. */
  edges(startS: number): GateEdge[] {
    const { memory, driver } = this;
    const isSpecial = this.pattern.hasOverride(memory, startS, startS + this.periodS);
    if (!isSpecial && this.duty === this.cachedDuty && memory.direction === this.cachedDirection && driver.matches(this.cachedBefore)) {
      driver.restore(this.cachedAfter);
      return this.cachedEdges;
    }
    this.cachedBefore = isSpecial ? [] : driver.save();
    this.cachedDuty = this.duty;
    this.cachedDirection = memory.direction;
    const edges = driver.drive(this.pattern.commands(this.duty, memory, startS, isSpecial), this.periodS);
    this.cachedEdges = edges;
    this.cachedAfter = driver.save();
    return edges;
  }

  /** The period keeps the direction and no override touches it. */
  isPlain(startS: number): boolean {
    const duty = this.command.at(startS);
    if (duty !== 0 && Math.sign(duty) !== this.memory.direction) return false;
    return !this.pattern.hasOverride(this.memory, startS, startS + this.periodS);
  }

  restore(memory: CommandMemory, gates: readonly number[]): void {
    this.memory = memory;
    this.driver.restore(gates);
    this.cachedBefore = [];
  }
}
