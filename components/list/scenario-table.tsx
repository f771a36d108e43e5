"use client";

import Link from "next/link";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { Toast, type ToastContent } from "@/components/ui/toast";
import type { ScenarioFilter, ScenarioList, ScenarioRow } from "@/db/queries/scenarios";
import { errorText } from "@/lib/errors";
import { filterHref } from "./filter";
import { FilterBar } from "./filter-bar";
import { ImportScenario } from "./import-scenario";
import { NewScenario, type TemplateChoice } from "./new-scenario";
import type { ListActions } from "./list-actions";
import { Row } from "./row";
import { useListKeys } from "./use-list-keys";

type Props = { list: ScenarioList; filter: ScenarioFilter; workspaceName: string; mayCreate: boolean; role: string; templates: TemplateChoice[]; actions: ListActions };

const NO_RIGHT = (role: string) => `As a ${role} you cannot make scenarios here; duplicate one that you may open.`;

/** The scenarios of a workspace: find, open, duplicate, archive; make and import. */
export function ScenarioTable({ list, filter, workspaceName, mayCreate, role, templates, actions }: Props) {
  const router = useRouter();
  const [opened, setOpened] = useState<"new" | "import" | null>(null);
  const [toast, setToast] = useState<ToastContent | null>(null);
  const { rows, counts } = list;

  async function duplicate(row: ScenarioRow) {
    const result = await actions.duplicateScenario({ scenarioId: row.id });
    if (result.ok) router.push(`/scenarios/${result.value.id}`);
    else setToast({ text: errorText(result.code) });
  }
  async function setArchived(row: ScenarioRow, isArchived: boolean) {
    const result = await (isArchived ? actions.archiveScenario : actions.restoreScenario)({ scenarioId: row.id });
    if (!result.ok) return setToast({ text: errorText(result.code) });
    setToast({ text: `${isArchived ? "Archived" : "Restored"} “${row.title}”`, undo: () => void setArchived(row, !isArchived) });
    router.refresh();
  }

  const [current, setCurrent] = useListKeys(rows, { onNew: () => mayCreate && setOpened("new"), onDuplicate: duplicate, onOpen: (row) => router.push(`/scenarios/${row.id}`) });
  const scaleA = Math.max(...rows.map((row) => row.summary?.scaleA ?? 0), 0);
  const errorScaleA = 0.02 * scaleA || 1;
  return (
    <div className="flex grow flex-col px-8 pt-6 max-[719px]:px-4">
      <div className="flex flex-wrap items-baseline gap-x-4 gap-y-2">
        <h1>Scenarios</h1>
        <p className="grow text-ink3">
          {counts.all} in {workspaceName}
          {counts.inReview > 0 && ` · ${counts.inReview} in review`}
        </p>
        <Button disabledReason={mayCreate ? undefined : NO_RIGHT(role)} onClick={() => setOpened("import")}>
          Import…
        </Button>
        <Button kind="primary" disabledReason={mayCreate ? undefined : NO_RIGHT(role)} onClick={() => setOpened("new")}>
          New scenario
        </Button>
      </div>
      <FilterBar list={list} filter={filter} />
      {rows.length === 0 ? (
        <Nothing filter={filter} mayCreate={mayCreate} onNew={() => setOpened("new")} onImport={() => setOpened("import")} />
      ) : (
        <table className="almanac mt-4 max-[719px]:block">
          <thead className="max-[719px]:sr-only">
            <tr>
              <th scope="col">Scenario</th>
              <th scope="col">State</th>
              <th scope="col" className="max-[999px]:hidden">Owner</th>
              <th scope="col">Motor current, last run {scaleA > 0 && <span className="u">±{scaleA.toPrecision(2)} A</span>}</th>
              <th scope="col" className="num!">RMS <span className="u">A</span></th>
              <th scope="col" className="num! max-[1199px]:hidden">Ripple <span className="u">A p-p</span></th>
              <th scope="col" className="num! max-[999px]:hidden">Headroom <span className="u">V</span></th>
              <th scope="col" className="num!">Worst error <span className="u">A</span></th>
              <th scope="col" className="num!">Changed</th>
              <th scope="col"><span className="visually-hidden">Actions</span></th>
            </tr>
          </thead>
          <tbody className="max-[719px]:block">
            {rows.map((row, index) => (
              <Row key={row.id} row={row} scaleA={scaleA} errorScaleA={errorScaleA} isCurrent={index === current} onPoint={() => setCurrent(index)} onDuplicate={() => void duplicate(row)} onArchive={() => void setArchived(row, !row.isArchived)} />
            ))}
          </tbody>
        </table>
      )}
      <footer className="mt-auto flex h-foot items-center gap-4 border-t border-ink text-ink2 max-[719px]:h-14">
        <span className="grow max-[719px]:hidden">
          <kbd>J</kbd> <kbd>K</kbd> move &nbsp; <kbd>Enter</kbd> open &nbsp; <kbd>D</kbd> duplicate &nbsp; <kbd>N</kbd> new &nbsp; <kbd>/</kbd> search
        </span>
        <Pages list={list} filter={filter} />
      </footer>
      {opened === "new" && <NewScenario templates={templates} createScenario={actions.createScenario} onClose={() => setOpened(null)} />}
      {opened === "import" && <ImportScenario createScenario={actions.createScenario} onClose={() => setOpened(null)} />}
      <Toast content={toast} onDone={() => setToast(null)} />
    </div>
  );
}

function Pages({ list, filter }: { list: ScenarioList; filter: ScenarioFilter }) {
  const first = (list.page - 1) * 50 + 1;
  return (
    <span className="flex gap-4">
      {list.total > 0 && `${first}–${first + list.rows.length - 1} of ${list.total}`}
      {list.page > 1 && <Link href={filterHref(filter, { page: list.page - 1 })}>Previous</Link>}
      {list.page < list.pageCount && <Link href={filterHref(filter, { page: list.page + 1 })}>Next</Link>}
    </span>
  );
}

function Nothing({ filter, mayCreate, onNew, onImport }: { filter: ScenarioFilter; mayCreate: boolean; onNew: () => void; onImport: () => void }) {
  const isFiltered = Boolean(filter.search || filter.owner || filter.state || filter.tag || filter.archived);
  return (
    <div className="mt-4 border-t-[3px] border-double border-ink py-10">
      <p className="font-serif text-[20px]/[28px]">{isFiltered ? "Nothing matches these filters." : "No scenarios yet."}</p>
      <p className="mt-4 flex gap-3">
        {isFiltered ? (
          <Link className="button" data-kind="primary" href="/scenarios">
            Clear the filters
          </Link>
        ) : mayCreate ? (
          <>
            <Button kind="primary" onClick={onNew}>
              Start from a template
            </Button>
            <Button onClick={onImport}>Import…</Button>
          </>
        ) : (
          <span className="text-ink2">Approved scenarios of your workspace appear here.</span>
        )}
      </p>
    </div>
  );
}
