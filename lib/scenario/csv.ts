import { TRACE_NAMES, type Simulation, type TraceName, type View } from "@/lib/engine/results";
import { FIGURE_LIST, figureLabel, formatFigure, READOUT_LIST } from "@/lib/explain/figure-list";
import { formatQuantity } from "@/lib/units/format";
import { isLegSite, type ScenarioDocument } from "./schema";

/** Waveforms and figures as text that other programs take. */

/**
 * One cell by RFC 4180. Text that a spreadsheet would run as a formula gets an apostrophe in front: it may come from a
 * title that somebody else typed. Numbers are written plainly, so that a leading minus stays a minus.
 */
export function csvCell(value: string | number | null): string {
  if (value === null) return "";
  if (typeof value === "number") return Number.isFinite(value) ? String(value) : "";
  const safe = /^\s*[=+\-@\t\r]/.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

const csvLine = (cells: ReadonlyArray<string | number | null>): string => `${cells.map(csvCell).join(",")}\r\n`;

const IDEAL = { label: "Ideal output", unit: "V" };

function columnTitle(name: TraceName): string {
  const { label, unit } = name === "idealV" ? IDEAL : READOUT_LIST.find((readout) => readout.name === name)!;
  return `${label} (${unit})`;
}

/**
 * The view as CSV: time and every trace that it has, in SI units, units in the header. A jump has two rows at one time; an
 * envelope has two columns for each trace. The first line names the scenario.
 */
export function viewToCsv(view: View, document: ScenarioDocument): string {
  const names = TRACE_NAMES.filter((name) => view.traces[name] !== undefined);
  const isEnvelope = view.kind === "envelope";
  const titles = names.flatMap((name) =>
    isEnvelope ? [`${columnTitle(name)} min`, `${columnTitle(name)} max`] : [columnTitle(name)],
  );
  const lines = [csvLine([document.title]), csvLine(["Time (s)", ...titles])];
  for (let index = 0; index < view.timeS.length; index += 1) {
    const cells: Array<number | null> = [view.timeS[index]];
    for (const name of names) {
      const trace = view.traces[name]!;
      if (isEnvelope) cells.push(trace.min[index]);
      cells.push(trace.max[index]);
    }
    lines.push(csvLine(cells));
  }
  return lines.join("");
}

/** Figures with label, symbol, value in the SI unit, unit and the text as shown. */
export function figuresToCsv(document: ScenarioDocument, simulation: Simulation): string {
  const hasLegs = isLegSite(document.sensing.site);
  const rows = FIGURE_LIST.map(({ name, unit }) => {
    const value = simulation.figures[name];
    return csvLine([
      figureLabel(name, hasLegs),
      name,
      value,
      unit === "share" ? "" : unit,
      formatFigure(name, value).text,
    ]);
  });
  return csvLine([document.title]) + csvLine(["Figure", "Name", "Value", "Unit", "Shown"]) + rows.join("");
}

/** The figures as lines to paste into a message; figures that this run has not are left out. */
export function figuresToText(document: ScenarioDocument, simulation: Simulation): string {
  const { window } = simulation;
  const time = (valueS: number) => formatQuantity(valueS, "s", { digits: 6 }).text;
  const lines = [document.title, `Figures from ${time(window.fromS)} to ${time(window.toS)}`];
  const hasLegs = isLegSite(document.sensing.site);
  const shown = FIGURE_LIST.filter(({ name }) => simulation.figures[name] !== null);
  const width = Math.max(...shown.map(({ name }) => figureLabel(name, hasLegs).length));
  let group = "";
  for (const figure of shown) {
    if (figure.group !== group) lines.push("", figure.group);
    group = figure.group;
    lines.push(
      `  ${figureLabel(figure.name, hasLegs).padEnd(width)}  ${formatFigure(figure.name, simulation.figures[figure.name]).text}`,
    );
  }
  return `${lines.join("\n")}\n`;
}
