"use client";

import { DropdownMenu } from "radix-ui";
import Link from "next/link";
import { Button } from "@/components/ui/button";
import type { ScenarioRow } from "@/db/queries/scenarios";
import { MINUS } from "@/lib/units/format";
import { ErrorBar } from "./error-bar";
import { Spark } from "./spark";
import { changedWords, STATE_WORDS } from "./words";

const figure = (value: number, digits = 3) => value.toPrecision(digits).replace("-", MINUS);
const ITEM = "block w-full px-3 py-[7px] text-left no-underline outline-none data-[highlighted]:bg-ink data-[highlighted]:text-on-ink data-[disabled]:text-ink3 max-[719px]:py-3";
const CELL = "max-[719px]:inline-block max-[719px]:border-0! max-[719px]:p-0! max-[719px]:pr-4!";

type Props = { row: ScenarioRow; scaleA: number; errorScaleA: number; isCurrent: boolean; onPoint: () => void; onDuplicate: () => void; onArchive: () => void };

/** One scenario of the list: a table row, on a phone a block of its own. */
export function Row({ row, scaleA, errorScaleA, isCurrent, onPoint, onDuplicate, onArchive }: Props) {
  const { summary } = row;
  const error = summary?.reconstructionErrorMaxA ?? null;
  return (
    <tr className={`${isCurrent ? "bg-sheet" : ""} max-[719px]:block max-[719px]:border-b max-[719px]:border-rule max-[719px]:py-3`} aria-current={isCurrent || undefined} onMouseEnter={onPoint}>
      <td className={`${isCurrent ? "border-l-[3px] border-l-ink" : "border-l-[3px] border-l-transparent"} ${CELL} max-[719px]:block!`}>
        <Link href={`/scenarios/${row.id}`} className="font-semibold no-underline hover:underline" prefetch={false}>
          {row.title}
        </Link>
        <br />
        <span className="text-ink3">{row.tags.join(" · ")}</span>
      </td>
      <td className={CELL}>
        <span className="state" data-state={row.state}>
          {STATE_WORDS[row.state]}
        </span>
      </td>
      <td className="max-[999px]:hidden">{row.ownerName}</td>
      <td className={`${CELL} max-[719px]:block!`}>
        {summary ? (
          <Spark minA={summary.spark.minA} maxA={summary.spark.maxA} scaleA={scaleA} label={`Motor current of the last run, up to ${figure(summary.scaleA, 2)} ampere`} />
        ) : (
          <span className="text-ink2">
            Not run yet. <Link href={`/scenarios/${row.id}`}>Run</Link>
          </span>
        )}
      </td>
      <td className={`num ${CELL}`}>
        <span className="text-ink3 min-[720px]:hidden">RMS </span>
        {summary ? figure(summary.motorRmsA) : "–"}
        <span className="text-ink3 min-[720px]:hidden"> A</span>
      </td>
      <td className="num max-[1199px]:hidden">{summary ? figure(summary.motorRippleA, 2) : "–"}</td>
      <td className="num max-[999px]:hidden">{!summary ? "–" : summary.clippedShare > 0 ? <b className="text-fault">clips</b> : summary.headroomV === null ? "–" : figure(summary.headroomV, 2)}</td>
      <td className={`num ${CELL}`}>
        {error === null ? (
          "–"
        ) : (
          <span className="inline-flex items-center gap-2">
            <span className="max-[1199px]:hidden">
              <ErrorBar errorA={error} scaleA={errorScaleA} />
            </span>
            <span className={error > errorScaleA ? "font-bold text-fault" : ""}>
              <span className="font-normal text-ink3 min-[720px]:hidden">error </span>±{figure(error, 2)}
            </span>
          </span>
        )}
      </td>
      <td className={`num ${CELL}`} suppressHydrationWarning>
        {changedWords(row.changedAt, Date.now())}
        <br className="max-[719px]:hidden" />
        <span className="text-ink3"> rev {row.revisionNumber}</span>
      </td>
      <td className={`num ${CELL}`}>
        <DropdownMenu.Root>
          <DropdownMenu.Trigger asChild>
            <Button kind="quiet" aria-label={`Actions for ${row.title}`}>
              •••
            </Button>
          </DropdownMenu.Trigger>
          <DropdownMenu.Portal>
            <DropdownMenu.Content align="end" className="z-30 min-w-44 border border-ink bg-sheet py-1">
              <DropdownMenu.Item asChild className={ITEM}>
                <Link href={`/scenarios/${row.id}`}>Open</Link>
              </DropdownMenu.Item>
              <DropdownMenu.Item className={ITEM} disabled={!row.mayDuplicate} onSelect={onDuplicate}>
                Duplicate
              </DropdownMenu.Item>
              <DropdownMenu.Item className={ITEM} disabled={!row.mayArchive} onSelect={onArchive}>
                {row.isArchived ? "Restore" : "Archive"}
                {!row.mayArchive && <span className="block text-[11px]">your role cannot</span>}
              </DropdownMenu.Item>
            </DropdownMenu.Content>
          </DropdownMenu.Portal>
        </DropdownMenu.Root>
      </td>
    </tr>
  );
}
