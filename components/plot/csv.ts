import { TRACE_NAMES, type View } from "@/lib/engine/results";
import { lowerBound, upperBound } from "./decimate";
import type { PlotWindow } from "./scale";

/**
 * The visible window as CSV with CRLF line ends (RFC 4180): time and every waveform the run has, in SI units at the engine's own points.
 * An exact view has two rows where a value jumps; an envelope has two columns, smallest and largest, for each waveform.
 */
export function viewToCsv(view: View, range: PlotWindow): string {
  const names = TRACE_NAMES.filter((name) => view.traces[name] !== undefined);
  const isEnvelope = view.kind === "envelope";
  const head = ["timeS", ...names.flatMap((name) => (isEnvelope ? [`${name} min`, `${name} max`] : [name]))];
  const lines = [head.join(",")];
  const end = upperBound(view.timeS, range.toS);
  for (let index = lowerBound(view.timeS, range.fromS); index < end; index += 1) {
    const cells = [String(view.timeS[index])];
    for (const name of names) {
      const trace = view.traces[name]!;
      if (isEnvelope) cells.push(String(trace.min[index]));
      cells.push(String(trace.max[index]));
    }
    lines.push(cells.join(","));
  }
  return lines.join("\r\n") + "\r\n";
}
