import Link from "next/link";
import { Button } from "@/components/ui/button";
import type { ScenarioFilter } from "@/db/queries/scenarios";

type Props = { filter: ScenarioFilter; mayCreate: boolean; onNew: () => void; onImport: () => void };

/** The list without rows: says why it is empty, and the way on. */
export function Nothing({ filter, mayCreate, onNew, onImport }: Props) {
  const isFiltered = Boolean(filter.search || filter.owner || filter.state || filter.tag || filter.archived);
  return (
    <div className="mt-4 border-t-[3px] border-double border-ink py-10">
      <p className="font-serif text-[20px]/[28px]">{filter.archived ? "Nothing is archived." : isFiltered ? "Nothing matches these filters." : "No scenarios yet."}</p>
      <div className="mt-4 flex flex-wrap gap-3">
        {isFiltered ? (
          <Link className="button" data-kind="primary" href="/scenarios">
            {filter.archived ? "Back to all scenarios" : "Clear the filters"}
          </Link>
        ) : mayCreate ? (
          <>
            <Button kind="primary" onClick={onNew}>
              Start from a template
            </Button>
            <Button onClick={onImport}>Import…</Button>
          </>
        ) : (
          <p className="text-ink2">Approved scenarios of your workspace appear here, and the copies you make of them.</p>
        )}
      </div>
    </div>
  );
}
