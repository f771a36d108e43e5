import type { Result } from "@/lib/result";
import type { ScenarioDocument } from "@/lib/scenario/schema";

/** The server actions of the list, handed down by the page. */
export type ListActions = {
  createScenario: (input: { templateId?: string; document?: unknown; title?: string }) => Promise<Result<{ id: string }>>;
  duplicateScenario: (input: { scenarioId: string; title?: string }) => Promise<Result<{ id: string }>>;
  readDocument: (input: { scenarioId: string }) => Promise<Result<ScenarioDocument>>;
  archiveScenario: (input: { scenarioId: string }) => Promise<Result<null>>;
  restoreScenario: (input: { scenarioId: string }) => Promise<Result<null>>;
};
