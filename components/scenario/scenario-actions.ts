import type { KeptDraft } from "@/db/queries/revisions";
import type { Result } from "@/lib/result";

/** The server actions this page uses, as app/(work)/scenarios exports them; the page hands them in. */
export type ScenarioActions = {
  saveRevision: (input: {
    scenarioId: string;
    baseRevisionNumber: number;
    document: unknown;
    message?: string;
  }) => Promise<Result<{ number: number; revisionId: string }>>;
  keepMineAsRevision: (input: {
    scenarioId: string;
    draftId: string;
    baseRevisionNumber: number;
    message?: string;
  }) => Promise<Result<{ number: number; revisionId: string }>>;
  listKeptDrafts: (input: { scenarioId: string }) => Promise<Result<KeptDraft[]>>;
  renameScenario: (input: { scenarioId: string; title: string }) => Promise<Result<{ title: string }>>;
  setTags: (input: { scenarioId: string; tags: string[] }) => Promise<Result<{ tags: string[] }>>;
  duplicateScenario: (input: { scenarioId: string; title?: string }) => Promise<Result<{ id: string }>>;
};
