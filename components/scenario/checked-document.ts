import { parseScenario, type ScenarioDocument } from "@/lib/scenario/schema";
import { isSameData } from "./same-data";
import type { ScenarioState } from "./scenario-state";

/** What an edit changes besides the document: a document that is refused never reaches the engine. */
export function withDocument(state: ScenarioState, document: ScenarioDocument): Partial<ScenarioState> {
  const parsed = parseScenario(document);
  if (parsed.ok)
    return {
      document,
      findings: [],
      goodDocument: isSameData(document, state.goodDocument) ? state.goodDocument : document,
    };
  return { document, findings: parsed.findings };
}

export const isDirty = (state: Pick<ScenarioState, "document" | "base">): boolean =>
  state.document !== state.base.document && !isSameData(state.document, state.base.document);
