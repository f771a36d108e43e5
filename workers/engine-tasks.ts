import { createRun, type Run } from "@/lib/engine/index";
import type { InstantReading, View, ViewRequest } from "@/lib/engine/results";
import { parseScenario } from "@/lib/scenario/schema";
import type { EngineFailure, Outcome, Progress, RunReply, RunRequest } from "./protocol";

/** Longest stretch of work between two looks at the message queue, ms: half a frame. */
const SLICE_MS = 8;
const DEFAULT_COLUMNS = 1200;
const WARM_RUNS = 6;
const WARM_SLICE_PERIODS = 4;

const failed = (failure: EngineFailure): Outcome<never> => ({ ok: false, failure });

/**
 * What the worker does, as plain functions of the protocol's types: tests and Node call them directly. One instance keeps
 * the last finished run, for views and readings of any interval.
 */
export class EngineTasks {
  private last: Run | null = null;
  private newest = 0;

  /** `pause` hands the thread back for a moment, so that a newer request or a cancel can arrive. `warmDocument`: see warmUp. */
  constructor(private readonly pause: () => Promise<void>, private readonly nowMs: () => number, private readonly warmDocument?: RunRequest["document"]) {}

  /** Runs a document; a newer call or `cancel` ends it early. The previous run stays until this one is finished. */
  async run(request: RunRequest, onProgress?: (progress: Progress) => void): Promise<Outcome<RunReply>> {
    this.openCount++;
    try {
      return await this.compute(request, onProgress);
    } finally {
      this.openCount--;
      void this.warmUp();
    }
  }

  private async compute(request: RunRequest, onProgress?: (progress: Progress) => void): Promise<Outcome<RunReply>> {
    const serial = ++this.newest;
    this.isCancelled = false;
    const parsed = parseScenario(request.document);
    if (!parsed.ok) return failed({ code: "input.invalid", findings: parsed.findings });
    const startMs = this.nowMs();
    const run = createRun(parsed.document, { at: request.at, traces: true });
    let sliceMs = startMs;
    while (!run.advance(64)) {
      const nowMs = this.nowMs();
      if (nowMs - sliceMs < SLICE_MS) continue;
      onProgress?.({ doneShare: run.doneShare, elapsedMs: nowMs - startMs });
      await this.pause();
      if (serial !== this.newest) return failed({ code: this.isCancelled ? "engine.cancelled" : "engine.superseded" });
      sliceMs = this.nowMs();
    }
    const simulation = run.finish();
    if (simulation.status !== "reached-end") return failed({ code: "engine.failed", text: simulation.statusText });
    this.last = run;
    const { durationS } = simulation;
    const view = run.view(request.view ?? { fromS: 0, toS: durationS, columnCount: DEFAULT_COLUMNS });
    const overview = run.view({ fromS: 0, toS: durationS, columnCount: request.overviewColumnCount ?? DEFAULT_COLUMNS });
    return { ok: true, value: { simulation, view, overview, computeMs: this.nowMs() - startMs } };
  }

  view(request: ViewRequest): Outcome<View> {
    if (!this.last) return failed({ code: "engine.no-run" });
    return { ok: true, value: this.last.view(request) };
  }

  readAt(times: number[]): Outcome<InstantReading[]> {
    if (!this.last) return failed({ code: "engine.no-run" });
    const { durationS } = this.last.document.run;
    return { ok: true, value: this.last.readAt(times.map((t) => Math.min(Math.max(t, 0), durationS))) };
  }

  private isCancelled = false;

  cancel(): void {
    this.newest++;
    this.isCancelled = true;
  }

  /**
   * Runs a small scenario a few times while nobody waits, so that the runs that follow meet compiled code. Gives way to a
   * request at once and goes on after it.
   */
  async warmUp(): Promise<void> {
    if (!this.warmDocument || this.isWarming) return;
    this.isWarming = true;
    while (this.warmRunsLeft > 0 && this.openCount === 0) {
      const run = createRun(this.warmDocument, { traces: true });
      while (this.openCount === 0 && !run.advance(WARM_SLICE_PERIODS)) await this.pause();
      await this.pause();
      if (this.openCount > 0) break;
      run.finish();
      run.view({ fromS: 0, toS: this.warmDocument.run.durationS, columnCount: 600 });
      this.warmRunsLeft--;
      await this.pause();
    }
    this.isWarming = false;
  }

  private openCount = 0;
  private isWarming = false;
  private warmRunsLeft = WARM_RUNS;
}
