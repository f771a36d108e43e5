import type { Metadata } from "next";
import { ScenarioWorkbench } from "@/components/scenario/scenario-workbench";
import { ShareButton } from "@/components/share/share-button";
import { db } from "@/db/client";
import { requireScenario } from "@/db/queries/scenarios";
import { orNotFound, requireScope } from "@/lib/server/actor";
import { duplicateScenario } from "../actions";
import {
  changeExpiry,
  createShareLink,
  keepMineAsRevision,
  listKeptDrafts,
  listShareLinks,
  renameScenario,
  revokeShareLink,
  saveRevision,
  setTags,
} from "./actions";

type Props = { params: Promise<{ scenarioId: string }> };

const actions = { saveRevision, keepMineAsRevision, listKeptDrafts, renameScenario, setTags, duplicateScenario };
const shareActions = { createShareLink, listShareLinks, revokeShareLink, changeExpiry };

async function loadScenario({ params }: Props) {
  const [{ scenarioId }, scope] = await Promise.all([params, requireScope()]);
  return { scope, scenario: await orNotFound(requireScenario(db, scope, scenarioId)) };
}

export async function generateMetadata(props: Props): Promise<Metadata> {
  const { scenario } = await loadScenario(props);
  return { title: scenario.title };
}

/** The main job: inputs, bridge, waveforms, figures and notices of one scenario. */
export default async function ScenarioPage(props: Props) {
  const { scope, scenario } = await loadScenario(props);
  const { revision } = scenario;
  return (
    <ScenarioWorkbench
      // another scenario, or a revision saved elsewhere and loaded anew, starts with a store of its own
      key={scenario.id}
      mayDuplicate={scenario.mayDuplicate}
      isArchived={scenario.isArchived}
      actions={actions}
      share={<ShareButton scenarioId={scenario.id} mayShare={scenario.mayShare} actions={shareActions} />}
      initial={{
        scenarioId: scenario.id,
        personId: scope.userId,
        mode: scenario.mayEdit ? "edit" : "read",
        title: scenario.title,
        tags: scenario.tags,
        revisionState: scenario.state,
        base: {
          number: revision.number,
          document: revision.document,
          savedAtMs: revision.createdAt.getTime(),
          authorName: revision.authorName,
        },
      }}
    />
  );
}
