import type { ScenarioDocument } from "../../scenario/schema";
import { parameterChangeTimes, stageParametersAt, type ShuntResistances, type StageParameters } from "../model/parameters";
import type { WindingNode } from "./winding";

/** The stage's parameters over time: faults and shaft entries that are reached, and the winding's temperature. */
export class ParameterTimeline {
  /** When the parameters in force were made, s. */
  madeAtS = 0;
  /** Number of instants of change that are behind. */
  passedCount = 0;
  /** Instants of change that the last `take` passed, first and last, s. */
  takenFromS = 0;
  takenToS = 0;
  private readonly times: number[];

  constructor(private readonly document: ScenarioDocument, private readonly shunt: ShuntResistances, private readonly winding: WindingNode | null) {
    this.times = parameterChangeTimes(document).filter((t) => t <= document.run.durationS);
  }

  /** The next instant of change, s; infinite if there is none. */
  get nextS(): number {
    return this.passedCount < this.times.length ? this.times[this.passedCount]! : Infinity;
  }

  /** Passes all changes up to `toS`; true if there were any. */
  take(toS: number): boolean {
    const fromIndex = this.passedCount;
    while (this.passedCount < this.times.length && this.times[this.passedCount]! <= toS) this.passedCount++;
    if (this.passedCount === fromIndex) return false;
    this.takenFromS = this.times[fromIndex]!;
    this.takenToS = this.times[this.passedCount - 1]!;
    return true;
  }

  /** Parameters with all that is reached at `timeS`, at the winding's present temperature. */
  at(timeS: number): StageParameters {
    this.madeAtS = timeS;
    return stageParametersAt(this.document, timeS, this.windingC(), this.shunt);
  }

  private windingC(): number {
    if (this.winding) return this.winding.temperatureC;
    return this.document.load.kind === "motor" ? this.document.load.motor.temperatureC : 20;
  }
}
