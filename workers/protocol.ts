import type { Finding } from "@/lib/result";
import type { InstantReading, Simulation, View, ViewRequest } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";

/** What goes to and comes from the engine worker: plain data, errors included (a thrown error loses its fields on the way). */

export type RunRequest = { document: ScenarioDocument; view?: ViewRequest; overviewColumnCount?: number; at?: number[] };

export type RunReply = {
  simulation: Simulation;
  /** The requested view, or the whole run if none was asked for. */
  view: View;
  /** The whole run at `overviewColumnCount` columns, for the overview strip. */
  overview: View;
  computeMs: number;
};

export type EngineFailure =
  | { code: "engine.cancelled" }
  | { code: "engine.superseded" }
  | { code: "engine.no-run" }
  | { code: "input.invalid"; findings: Finding[] }
  | { code: "engine.failed"; text: string };

export type Outcome<T> = { ok: true; value: T } | { ok: false; failure: EngineFailure };

export type Progress = { doneShare: number; elapsedMs: number };

/** The engine as the page sees it; `workers/engine-client.ts` makes one. A newer `run` supersedes an older one. */
export type EngineClient = {
  run(request: RunRequest, onProgress?: (progress: Progress) => void): Promise<Outcome<RunReply>>;
  view(request: ViewRequest): Promise<Outcome<View>>;
  readAt(times: number[]): Promise<Outcome<InstantReading[]>>;
  cancel(): void;
  dispose(): void;
};
