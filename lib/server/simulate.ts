import { createRun, type Simulation } from "@/lib/engine/index";
import { failure, success, type Finding, type Result } from "@/lib/result";
import { parseScenario, type ScenarioDocument } from "@/lib/scenario/schema";

export const SIMULATION_LIMITS = {
  bodyBytes: 256 * 1024,
  /** 10 s of drive at 20 kHz. */
  periodCount: 200_000,
  /** Conversions in the run: what `perPeriod` multiplies the periods to. */
  conversionCount: 2_000_000,
  atCount: 10_000,
  wallMs: 20_000,
} as const;

/** Periods between two looks at the clock and two breaths of the event loop. */
const SLICE = 1_000;

export type SimulationRequest = { document: ScenarioDocument; at: number[] };

/** The body of POST /api/v1/simulations: `{ document, at? }`, or the document itself. Answers every problem at once. */
export function readSimulationRequest(body: unknown): Result<SimulationRequest> {
  const isWrapped = typeof body === "object" && body !== null && "document" in body;
  const findings: Finding[] = [];
  if (isWrapped) {
    for (const name of Object.keys(body))
      if (name !== "document" && name !== "at")
        findings.push({ path: name, code: "input.unknown", text: "Unknown field; there are document and at." });
  }
  const parsed = parseScenario(isWrapped ? body.document : body);
  if (!parsed.ok) return failure("input.invalid", { findings: [...findings, ...parsed.findings] });
  const { document } = parsed;
  const at = isWrapped && "at" in body ? body.at : [];
  findings.push(...findAtFaults(at, document.run.durationS));
  if (findings.length > 0) return failure("input.invalid", { findings });

  const periodCount = Math.ceil(document.run.durationS * document.pwm.frequencyHz);
  const conversionCount = periodCount * document.sensing.converter.perPeriod;
  if (periodCount > SIMULATION_LIMITS.periodCount || conversionCount > SIMULATION_LIMITS.conversionCount) {
    return failure("engine.too-long", {
      findings: [
        {
          path: "run.durationS",
          code: "engine.too-long",
          text: `The run has ${periodCount} PWM periods and ${conversionCount} conversions; this address computes up to ${SIMULATION_LIMITS.periodCount} periods and ${SIMULATION_LIMITS.conversionCount} conversions.`,
        },
      ],
    });
  }
  return success({ document, at: at as number[] });
}

function findAtFaults(at: unknown, durationS: number): Finding[] {
  if (!Array.isArray(at)) return [{ path: "at", code: "input.invalid", text: "A list of times in seconds." }];
  if (at.length > SIMULATION_LIMITS.atCount)
    return [{ path: "at", code: "input.invalid", text: `At most ${SIMULATION_LIMITS.atCount} times.` }];
  return at.flatMap((time: unknown, index) =>
    typeof time === "number" && time >= 0 && time <= durationS
      ? []
      : [{ path: `at.${index}`, code: "input.invalid", text: `A time from 0 to ${durationS} s, the run's duration.` }],
  );
}

/** Runs the engine in slices, so that the server goes on answering others; stops when the caller has gone or the time is up. */
export async function runSimulation(
  { document, at }: SimulationRequest,
  signal: AbortSignal,
): Promise<Result<Simulation>> {
  const deadline = performance.now() + SIMULATION_LIMITS.wallMs;
  const run = createRun(document, { at, traces: false });
  while (!run.advance(SLICE)) {
    if (signal.aborted) return failure("engine.cancelled");
    if (performance.now() > deadline) return failure("engine.timed-out");
    await new Promise((resume) => setImmediate(resume));
  }
  return success(run.finish());
}
