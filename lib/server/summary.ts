import type { RunSummary } from "@/db/queries/scenarios";
import { createRun } from "@/lib/engine/index";
import { sampleLimitA } from "@/lib/engine/sensing/notices";
import type { ScenarioDocument } from "@/lib/scenario/schema";

const COLUMN_COUNT = 64;
/** Beyond this a save does not wait for a run: 2 s of drive at 20 kHz takes about 0.1 s here. The table then says "not run yet". */
const PERIOD_COUNT_MAX = 40_000;
/** Periods between two breaths of the event loop. */
const SLICE = 2_000;

const round = (value: number): number => Number(value.toPrecision(6));

/** The figures and the little picture that the scenario table shows for a revision; null for a run that is too long, or that left the finite numbers. */
export async function summarise(document: ScenarioDocument): Promise<RunSummary | null> {
  if (document.run.durationS * document.pwm.frequencyHz > PERIOD_COUNT_MAX) return null;
  const run = createRun(document);
  while (!run.advance(SLICE)) await new Promise((resume) => setImmediate(resume));
  const { status, durationS, figures } = run.finish();
  if (status !== "reached-end") return null;
  const trace = run.view({ fromS: 0, toS: durationS, columnCount: COLUMN_COUNT });
  const current = trace.traces.motorCurrentA;
  if (!current) return null;
  // an envelope has the columns already; a short run comes as break points
  const { minA, maxA } =
    trace.kind === "envelope"
      ? { minA: Array.from(current.min, round), maxA: Array.from(current.max, round) }
      : columnsOf(trace.timeS, current, durationS);
  return {
    motorRmsA: round(figures.motorRmsA),
    motorRippleA: round(figures.motorRippleA),
    headroomV: figures.headroomV === null ? null : round(figures.headroomV),
    clippedShare: round(figures.clippedShare),
    reconstructionErrorMaxA: figures.reconstructionErrorMaxA === null ? null : round(figures.reconstructionErrorMaxA),
    errorLimitA: round(sampleLimitA(document)),
    spark: { fromS: 0, toS: durationS, minA, maxA },
    scaleA: round(Math.max(...maxA.map(Math.abs), ...minA.map(Math.abs))),
  };
}

/** Break points to COLUMN_COUNT columns, joined by straight lines where a column border falls between two. */
function columnsOf(
  timeS: Float64Array,
  current: { min: Float64Array; max: Float64Array },
  durationS: number,
): { minA: number[]; maxA: number[] } {
  const minA = new Array<number>(COLUMN_COUNT).fill(Infinity);
  const maxA = new Array<number>(COLUMN_COUNT).fill(-Infinity);
  const columnAt = (time: number) =>
    Math.min(COLUMN_COUNT - 1, Math.max(0, Math.floor((time / durationS) * COLUMN_COUNT + 1e-9)));
  const put = (column: number, low: number, high: number) => {
    minA[column] = Math.min(minA[column]!, low);
    maxA[column] = Math.max(maxA[column]!, high);
  };
  for (let k = 0; k < timeS.length; k += 1) {
    put(columnAt(timeS[k]!), current.min[k]!, current.max[k]!);
    if (k === 0) continue;
    // the borders crossed on the way from the point before
    const [t0, t1] = [timeS[k - 1]!, timeS[k]!];
    for (let border = columnAt(t0) + 1; border <= columnAt(t1); border += 1) {
      const share = t1 > t0 ? Math.min(1, Math.max(0, ((border / COLUMN_COUNT) * durationS - t0) / (t1 - t0))) : 1;
      const low = current.min[k - 1]! + share * (current.min[k]! - current.min[k - 1]!);
      const high = current.max[k - 1]! + share * (current.max[k]! - current.max[k - 1]!);
      put(border - 1, low, high);
      put(border, low, high);
    }
  }
  for (let column = 1; column < COLUMN_COUNT; column += 1)
    if (minA[column] === Infinity) put(column, minA[column - 1]!, maxA[column - 1]!);
  return { minA: minA.map(round), maxA: maxA.map(round) };
}
