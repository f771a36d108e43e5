import Link from "next/link";
import type { AuditRow } from "@/db/queries/audit";
import { doneWords, thingOf } from "./deed-words";
import { Moment } from "./moment";

/** What was done in the workspace, newest first. `titles` names scenarios that can still be opened. */
export function AuditTable({ rows, titles }: { rows: AuditRow[]; titles: Map<string, string> }) {
  return (
    <table className="almanac stacked">
      <thead>
        <tr>
          <th>When</th>
          <th>Who</th>
          <th>What</th>
          <th>On what</th>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={row.id}>
            <td>
              <Moment at={row.createdAt} />
            </td>
            <td>{row.actorName}</td>
            <td title={`Request ${row.correlationId}`}>{doneWords(row.deed, row.detail)}</td>
            <td>
              <Thing row={row} titles={titles} />
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function Thing({ row, titles }: { row: AuditRow; titles: Map<string, string> }) {
  const { scenarioId, name } = thingOf(row);
  const isLink = row.deed.startsWith("share.");
  if (scenarioId) {
    const title = titles.get(scenarioId) ?? (isLink ? "" : name);
    return (
      <>
        {isLink && name && <>“{name}” of </>}
        <Link href={`/scenarios/${scenarioId}`}>{title || `scenario ${scenarioId.slice(0, 8)}`}</Link>
      </>
    );
  }
  if (isLink && row.thingId) return <>link {row.thingId.slice(0, 8)}</>;
  return <>{name || "–"}</>;
}
