import type { Metadata } from "next";
import { ScenarioTable } from "@/components/list/scenario-table";
import { readFilter, type SearchParams } from "@/components/list/filter";
import { db } from "@/db/client";
import { findScenarios } from "@/db/queries/scenarios";
import { can } from "@/lib/access/table";
import { TEMPLATES } from "@/lib/scenario/templates";
import { requireScope } from "@/lib/server/actor";
import { archiveScenario, createScenario, duplicateScenario, readDocument, restoreScenario } from "./actions";

export const metadata: Metadata = { title: "Scenarios" };

/** Rows of a page. */
const PAGE_SIZE = 50;
const actions = { createScenario, duplicateScenario, readDocument, archiveScenario, restoreScenario };
const templates = TEMPLATES.map(({ id, title, purpose, tags }) => ({ id, title, purpose, tags: [...tags] }));

export default async function ScenariosPage({ searchParams }: { searchParams: Promise<SearchParams> }) {
  const scope = await requireScope();
  const filter = readFilter(await searchParams);
  const list = await findScenarios(db, scope, { ...filter, pageSize: PAGE_SIZE });
  return <ScenarioTable list={list} filter={filter} pageSize={PAGE_SIZE} workspaceName={scope.workspaceName} mayCreate={can(scope.role, "scenario.create")} role={scope.role} templates={templates} actions={actions} />;
}
