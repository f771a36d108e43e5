import type { ScenarioView } from "@/db/queries/scenarios";
import type { Figures, InstantReading, Simulation, View } from "@/lib/engine/results";
import type { ErrorCode } from "@/lib/errors";
import type { Finding } from "@/lib/result";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import type { Progress } from "@/workers/protocol";
import type { History } from "./history";

/** `edit`: saves revisions. `read`: plays with the values, cannot save. `guest`: came by a share link; nothing is kept. */
export type WorkbenchMode = "edit" | "read" | "guest";

/** The revision that the draft started from. */
export type BaseRevision = { number: number; document: ScenarioDocument; savedAtMs: number; authorName: string };

export type InitialScenario = {
  /** `null` for a guest and the example of the front page: there is nothing to save to. */
  scenarioId: string | null;
  personId: string | null;
  mode: WorkbenchMode;
  title: string;
  tags: string[];
  /** State of the revision; left out where there are none to speak of (a guest, the front page). */
  revisionState?: ScenarioView["state"] | null;
  base: BaseRevision;
};

export type TimeWindow = { fromS: number; toS: number };

export type Gesture = {
  path: string;
  before: ScenarioDocument;
  /** Figures when the drag began: shown as old → new. */
  figures: Figures | null;
};

export type RunPhase = "waiting" | "upToDate" | "recomputing" | "stale" | "failed";

export type RunStatus = {
  phase: RunPhase;
  /** After 300 ms of computing: the last run fades and the progress border fills. */
  isSlow: boolean;
  /** After 2 s: words, time left and Cancel. */
  isLong: boolean;
  progress: Progress | null;
  problem: { title: string; text: string } | null;
  computeMs: number | null;
};

/** A run as it is shown. `document` is the one it was computed from: the drawings go with it, not with the draft. */
export type ShownRun = {
  simulation: Simulation;
  view: View;
  overview: View;
  document: ScenarioDocument;
  isCoarse: boolean;
};

export type NewestRevision = { number: number; authorName: string; createdAtMs: number; document: ScenarioDocument };
export type Conflict = {
  newest: NewestRevision;
  mine: { draftId: string; document: ScenarioDocument };
  message: string;
};

export type RestoredDraft = { keptAtMs: number; baseNumber: number; document: ScenarioDocument };

export type SaveState = {
  isSaving: boolean;
  /** Why the last attempt failed; cleared by the next edit or attempt. */
  problem: { code: ErrorCode; text: string } | null;
  isOffline: boolean;
  conflict: Conflict | null;
  restored: RestoredDraft | null;
};

export type Said = { id: number; text: string; canUndo: boolean };

export type ScenarioState = {
  scenarioId: string | null;
  personId: string | null;
  mode: WorkbenchMode;
  title: string;
  tags: string[];
  revisionState: ScenarioView["state"] | null;

  base: BaseRevision;
  /** The newest revision this page knows of; an older draft may be based on an earlier one. */
  newest: BaseRevision;
  document: ScenarioDocument;
  /** Everything wrong with `document`; the run keeps `goodDocument` meanwhile. */
  findings: readonly Finding[];
  goodDocument: ScenarioDocument;
  /** Text typed into a field that cannot be taken; kept while its section is closed. */
  refusedText: Readonly<Record<string, string>>;
  /** An approved revision: inputs are text until a new draft is started on top of it. */
  isLocked: boolean;
  history: History;
  gesture: Gesture | null;
  /** Value of a slider before its last drag, for the dashed lozenge, until the next edit. */
  dragStart: { path: string; value: number } | null;

  save: SaveState;

  run: RunStatus;
  shown: ShownRun | null;
  reading: InstantReading | null;
  cursorS: number;
  pinS: number | null;
  viewWindow: TimeWindow;

  /** A field that a notice or finding asks to go to; the inputs panel opens its section and focuses it. */
  wantedPath: { path: string; id: number } | null;
  pinnedFigure: string | null;
  areLettersOn: boolean;
  said: Said | null;
};
