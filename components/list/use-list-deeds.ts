"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { download, fileNameOf } from "@/components/scenario/downloads";
import { reach } from "@/components/scenario/saving";
import type { ToastContent } from "@/components/ui/toast";
import type { ScenarioRow } from "@/db/queries/scenarios";
import { errorText } from "@/lib/errors";
import type { ListActions } from "./list-actions";
import type { RowDeeds } from "./row-menu";

/** The deeds on a row and what is said of them; archiving offers Undo in place of a question. */
export function useListDeeds(actions: ListActions): { deeds: RowDeeds; toast: ToastContent | null; clearToast: () => void } {
  const router = useRouter();
  const [toast, setToast] = useState<ToastContent | null>(null);
  const [clearToast] = useState(() => () => setToast(null));

  async function onDuplicate(row: ScenarioRow) {
    const result = await reach(() => actions.duplicateScenario({ scenarioId: row.id }));
    if (result.ok) router.push(`/scenarios/${result.value.id}`);
    else setToast({ text: errorText(result.code) });
  }
  async function onExport(row: ScenarioRow) {
    const result = await reach(() => actions.readDocument({ scenarioId: row.id }));
    if (!result.ok) return setToast({ text: errorText(result.code) });
    download(fileNameOf(row.title, "json"), `${JSON.stringify(result.value, null, 2)}\n`, "application/json");
    setToast({ text: `Exported “${row.title}”, revision ${row.revisionNumber}` });
  }
  async function setArchived(row: ScenarioRow, isArchived: boolean) {
    const result = await reach(() => (isArchived ? actions.archiveScenario : actions.restoreScenario)({ scenarioId: row.id }));
    if (!result.ok) return setToast({ text: errorText(result.code) });
    setToast({ text: `${isArchived ? "Archived" : "Restored"} “${row.title}”`, undo: () => void setArchived(row, !isArchived) });
    router.refresh();
  }
  return {
    deeds: { onDuplicate: (row) => void onDuplicate(row), onExport: (row) => void onExport(row), onArchive: (row) => void setArchived(row, !row.isArchived) },
    toast,
    clearToast,
  };
}
