"use client";

import { useState } from "react";
import { useNow } from "@/components/scenario/use-now";
import { Button } from "@/components/ui/button";
import { Toast } from "@/components/ui/toast";
import type { ScenarioFilter, ScenarioList, ScenarioRow } from "@/db/queries/scenarios";
import { ROLE_WORDS, type Role } from "@/lib/access/table";
import { MINUS } from "@/lib/units/format";
import { FilterBar } from "./filter-bar";
import { ImportScenario } from "./import-scenario";
import type { ListActions } from "./list-actions";
import { ListFoot } from "./list-foot";
import { NewScenario, type TemplateChoice } from "./new-scenario";
import { Nothing } from "./nothing";
import { Row } from "./row";
import type { SparkScale } from "./spark";
import { useKeptSwitch } from "./use-kept-switch";
import { useListDeeds } from "./use-list-deeds";
import { useListKeys } from "./use-list-keys";

type Props = { list: ScenarioList; filter: ScenarioFilter; pageSize: number; workspaceName: string; mayCreate: boolean; role: Role; templates: TemplateChoice[]; actions: ListActions };

const barredFor = (role: Role) => `The role ${ROLE_WORDS[role].name.toLowerCase()} does not make scenarios here. You can duplicate one that you may open.`;

/** The scenarios of a workspace: find, open, duplicate, export, archive; make and import. */
export function ScenarioTable({ list, filter, pageSize, workspaceName, mayCreate, role, templates, actions }: Props) {
  const [opened, setOpened] = useState<"new" | "import" | null>(null);
  const [areKeysOn, setKeysOn] = useKeptSwitch("slackwater.list-keys");
  const { deeds, toast, clearToast } = useListDeeds(actions);
  const { rows, counts } = list;
  const [current, setCurrent] = useListKeys(rows, areKeysOn, { ...deeds, onNew: () => mayCreate && setOpened("new") });
  const disabledReason = mayCreate ? undefined : barredFor(role);
  const nowMs = useNow();
  const scale = scaleOf(rows);
  return (
    <div className="flex grow flex-col px-8 pt-5 max-[719px]:px-4">
      <div className="flex flex-wrap items-end gap-x-[14px] gap-y-2">
        <h1 className="text-[32px]/[36px] max-[719px]:text-[27px]/[32px]">Scenarios</h1>
        <p className="grow pb-[5px] text-ink3 max-[719px]:pb-[3px]">
          {counts.all} in {workspaceName}
          {counts.inReview > 0 && ` · ${counts.inReview} in review`}
        </p>
        <span className="flex gap-3 max-[719px]:w-full max-[719px]:*:grow max-[719px]:*:justify-center">
          <Button className="h-8!" disabledReason={disabledReason} onClick={() => setOpened("import")}>
            Import…
          </Button>
          <Button className="h-8!" kind="primary" disabledReason={disabledReason} onClick={() => setOpened("new")}>
            New scenario
            {mayCreate && areKeysOn && <kbd aria-hidden className="border-current! bg-transparent! text-inherit! opacity-80 max-[999px]:hidden">N</kbd>}
          </Button>
        </span>
      </div>
      <FilterBar list={list} filter={filter} areKeysOn={areKeysOn} />
      {rows.length === 0 ? (
        <Nothing filter={filter} mayCreate={mayCreate} onNew={() => setOpened("new")} onImport={() => setOpened("import")} />
      ) : (
        <table className="almanac list mt-4 mb-6 max-[719px]:block">
          <Columns scale={scale} />
          <tbody className="max-[719px]:block max-[719px]:border-t-[3px] max-[719px]:border-double max-[719px]:border-ink">
            {rows.map((row, index) => (
              <Row key={row.id} row={row} scale={scale} nowMs={nowMs} isCurrent={index === current} onPoint={() => setCurrent(index)} deeds={deeds} />
            ))}
          </tbody>
        </table>
      )}
      <ListFoot list={list} filter={filter} pageSize={pageSize} areKeysOn={areKeysOn} onKeys={setKeysOn} />
      {opened === "new" && <NewScenario templates={templates} createScenario={actions.createScenario} onClose={() => setOpened(null)} />}
      {opened === "import" && <ImportScenario createScenario={actions.createScenario} onClose={() => setOpened(null)} />}
      <Toast content={toast} onDone={clearToast} />
    </div>
  );
}

function Columns({ scale }: { scale: SparkScale }) {
  const { lowA, highA } = scale;
  return (
    <thead className="max-[719px]:sr-only">
      <tr>
        <th scope="col">Scenario</th>
        <th scope="col">State</th>
        <th scope="col" className="max-[999px]:hidden">Owner</th>
        <th scope="col">
          Motor current, last run{" "}
          {highA > lowA && (
            <span className="u">
              {lowA < 0 ? `${MINUS}${(-lowA).toPrecision(2)}` : "0"} to {highA.toPrecision(2)} A
            </span>
          )}
        </th>
        <th scope="col" className="num">RMS <span className="u">A</span></th>
        <th scope="col" className="num max-[1199px]:hidden">Ripple <span className="u">A p-p</span></th>
        <th scope="col" className="num max-[999px]:hidden">Headroom <span className="u">V</span></th>
        <th scope="col" className="num">Worst error <span className="u">A<span className="max-[1199px]:hidden">, limit at the marks</span></span></th>
        <th scope="col" className="num">Changed</th>
        <th scope="col"><span className="visually-hidden">Actions</span></th>
      </tr>
    </thead>
  );
}

/** One scale for the sparks of a page, so that they compare; a little above zero where all of them are reverse. */
function scaleOf(rows: readonly ScenarioRow[]): SparkScale {
  const sparks = rows.flatMap((row) => (row.summary ? [row.summary.spark] : []));
  return { lowA: Math.min(0, ...sparks.flatMap((spark) => spark.minA)), highA: Math.max(0, ...sparks.flatMap((spark) => spark.maxA)) };
}
