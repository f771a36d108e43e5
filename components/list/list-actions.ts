import type { Result } from "@/lib/result";

/** The server actions of the list, handed down by the page. */
export type ListActions = {
  createScenario: (input: { templateId?: string; document?: unknown; title?: string }) => Promise<Result<{ id: string }>>;
  duplicateScenario: (input: { scenarioId: string; title?: string }) => Promise<Result<{ id: string }>>;
  archiveScenario: (input: { scenarioId: string }) => Promise<Result<null>>;
  restoreScenario: (input: { scenarioId: string }) => Promise<Result<null>>;
};
