import Link from "next/link";
import type { RunSummary, ScenarioRow } from "@/db/queries/scenarios";
import { MINUS } from "@/lib/units/format";
import { ErrorBar } from "./error-bar";
import { RowMenu, type RowDeeds } from "./row-menu";
import { Spark, type SparkScale } from "./spark";
import { changedWords, linkId, STATE_WORDS } from "./words";

const figure = (value: number, digits: number) => Number(value.toPrecision(digits)).toFixed(decimalsOf(value, digits)).replace("-", MINUS);
const decimalsOf = (value: number, digits: number) => Math.max(0, digits - 1 - Math.floor(Math.log10(Math.abs(value) || 1)));
/** On a phone a cell is a line or part of a line in its row's block. */
const CELL = "max-[719px]:border-0! max-[719px]:p-0! max-[719px]:text-left!";

type Props = { row: ScenarioRow; scale: SparkScale; nowMs: number | null; isCurrent: boolean; onPoint: () => void; deeds: RowDeeds };

/** One scenario of the list: a table row, on a phone a block of its own. */
export function Row({ row, scale, nowMs, isCurrent, onPoint, deeds }: Props) {
  const { summary } = row;
  return (
    <tr
      className={`h-[55px] ${isCurrent ? "bg-sheet" : ""} max-[719px]:grid max-[719px]:h-auto max-[719px]:grid-cols-[auto_auto_1fr_auto] max-[719px]:items-center max-[719px]:gap-x-4 max-[719px]:gap-y-1 max-[719px]:border-b max-[719px]:border-rule max-[719px]:py-2`}
      aria-current={isCurrent || undefined}
      onMouseEnter={onPoint}
      onFocus={onPoint}
    >
      <td className={`${isCurrent ? "shadow-[inset_3px_0_0_var(--ink)] max-[719px]:shadow-none" : ""} ${CELL} max-[719px]:col-span-3`}>
        <Link id={linkId(row.id)} href={`/scenarios/${row.id}`} className="text-[14px] font-semibold no-underline hover:underline max-[719px]:block max-[719px]:pt-3 max-[719px]:text-[15px]" prefetch={false}>
          {row.title}
        </Link>
        <span className="block text-[12px]/[16px] text-ink3">{row.tags.join(" · ")}</span>
      </td>
      <td className={CELL}>
        <span className="state" data-state={row.state}>
          {STATE_WORDS[row.state]}
        </span>
      </td>
      <td className={`${CELL} max-[999px]:hidden whitespace-nowrap max-[719px]:block max-[719px]:text-ink2`}>{row.ownerName}</td>
      <td className={`${CELL} max-[719px]:order-1 max-[719px]:col-span-4`}>
        {summary ? (
          <Spark minA={summary.spark.minA} maxA={summary.spark.maxA} scale={scale} label={`Motor current of the last run, up to ${figure(summary.scaleA, 2)} ampere`} />
        ) : (
          <span className="text-ink2">
            Not run yet. <Link href={`/scenarios/${row.id}`}>Run</Link>
          </span>
        )}
      </td>
      <td className={`num ${CELL} max-[719px]:order-2`}>
        <PhoneWord>RMS </PhoneWord>
        {summary ? figure(summary.motorRmsA, 3) : "–"}
        {summary && <PhoneWord> A</PhoneWord>}
      </td>
      <td className="num max-[1199px]:hidden">{summary ? figure(summary.motorRippleA, 2) : "–"}</td>
      <td className="num max-[999px]:hidden">{summary ? <Headroom summary={summary} /> : "–"}</td>
      <td className={`num ${CELL} max-[719px]:order-2 max-[719px]:col-span-3`}>
        <PhoneWord>error </PhoneWord>
        {summary ? <WorstError summary={summary} /> : "–"}
      </td>
      <td className={`num ${CELL} max-[719px]:order-0 max-[719px]:col-span-2 max-[719px]:text-right!`}>
        {changedWords(row.changedAt, nowMs)}
        <span className="block text-[12px]/[16px] text-ink3 max-[719px]:inline"> rev {row.revisionNumber}</span>
      </td>
      <td className={`num ${CELL} max-[719px]:-order-1 max-[719px]:col-start-4 max-[719px]:row-start-1`}>
        <RowMenu row={row} deeds={deeds} />
      </td>
    </tr>
  );
}

/** Said in the column's head on a wide screen. */
const PhoneWord = ({ children }: { children: string }) => <span className="text-ink3 min-[720px]:hidden">{children}</span>;

function Headroom({ summary: { clippedShare, headroomV } }: { summary: RunSummary }) {
  if (clippedShare > 0) return <b className="font-semibold text-fault">clips</b>;
  return headroomV === null ? "–" : figure(headroomV, 2);
}

function WorstError({ summary: { reconstructionErrorMaxA: errorA, errorLimitA } }: { summary: RunSummary }) {
  if (errorA === null) return "–";
  const isOver = errorLimitA !== undefined && errorA > errorLimitA;
  return (
    <span className="inline-grid grid-cols-[96px_62px] items-center gap-2 max-[1199px]:inline-block">
      <span className="max-[1199px]:hidden">{errorLimitA !== undefined && <ErrorBar errorA={errorA} limitA={errorLimitA} />}</span>
      <span className={isOver ? "font-semibold text-fault" : ""}>
        ±{figure(errorA, 2)}
        <PhoneWord> A</PhoneWord>
        {isOver && <span className="visually-hidden"> over its limit of {figure(errorLimitA, 2)} A</span>}
      </span>
    </span>
  );
}
