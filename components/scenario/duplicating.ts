import { errorText } from "@/lib/errors";
import { isDirty } from "./checked-document";
import { reach } from "./saving";
import type { ScenarioActions } from "./scenario-actions";
import type { ScenarioStore } from "./store";

/** A copy of one's own, with the changes made here as its second revision. Answers the copy's id. */
export async function duplicateWithChanges(
  store: ScenarioStore,
  actions: Partial<ScenarioActions>,
): Promise<string | null> {
  const { scenarioId, document, base } = store.getState();
  const { duplicateScenario, saveRevision } = actions;
  if (scenarioId === null || !duplicateScenario || !saveRevision) return null;
  const copied = await reach(() => duplicateScenario({ scenarioId }));
  if (!copied.ok) {
    store.getState().say(errorText(copied.code));
    return null;
  }
  if (!isDirty({ document, base })) return copied.value.id;
  const saved = await reach(() =>
    saveRevision({
      scenarioId: copied.value.id,
      baseRevisionNumber: 1,
      document,
      message: "Changes made before copying",
    }),
  );
  if (!saved.ok) {
    store.getState().say(`The copy was made, but not your changes: ${errorText(saved.code)}`);
    return null;
  }
  return copied.value.id;
}
