import type { Finding } from "@/lib/result";
import { formatQuantity } from "@/lib/units/format";
import { PERIODS_MAX } from "./ranges";
import type { Reader } from "./reader";

/** Rules between times: points, shaft loads and special intervals in order, run and window within each other. */

const time = (valueS: number) => formatQuantity(valueS, "s", { digits: 7 }).text;
const broken = (path: string, name: string, text: string): Finding => ({ path, code: `rule.${name}`, text });

function ascending(read: Reader, list: string, what: string, startsAtZero: boolean): Finding[] {
  const findings: Finding[] = [];
  let before: number | undefined;
  for (let index = 0; index < read.count(list); index += 1) {
    const path = `${list}.${index}.timeS`;
    const timeS = read.number(path);
    if (timeS === undefined) continue;
    if (index === 0 && startsAtZero && timeS !== 0)
      findings.push(broken(path, "startsAtZero", `The first ${what} is at ${time(timeS)}; it must be at 0 s.`));
    if (before !== undefined && timeS <= before)
      findings.push(
        broken(
          path,
          "ascending",
          `This ${what} is at ${time(timeS)}, the one before at ${time(before)}; times must ascend.`,
        ),
      );
    before = timeS;
  }
  return findings;
}

/** D-07: half-open intervals, so one may start where another ends. */
function specialIntervals(read: Reader): Finding[] {
  const findings: Finding[] = [];
  const intervals: Array<{ fromS: number; toS: number; index: number }> = [];
  for (let index = 0; index < read.count("command.special"); index += 1) {
    const [fromS, toS] = [read.number(`command.special.${index}.fromS`), read.number(`command.special.${index}.toS`)];
    if (fromS === undefined || toS === undefined) continue;
    if (toS <= fromS)
      findings.push(
        broken(
          `command.special.${index}.toS`,
          "intervalOrder",
          `The special interval ends at ${time(toS)} but starts at ${time(fromS)}; enter an end after its start.`,
        ),
      );
    else intervals.push({ fromS, toS, index });
  }
  intervals.sort((a, b) => a.fromS - b.fromS || a.index - b.index);
  let reach: { toS: number } | undefined;
  for (const interval of intervals) {
    if (reach && interval.fromS < reach.toS) {
      findings.push(
        broken(
          `command.special.${interval.index}.fromS`,
          "overlap",
          `This special interval starts at ${time(interval.fromS)}, inside one that ends at ${time(reach.toS)}; special intervals must not overlap.`,
        ),
      );
    }
    if (!reach || interval.toS > reach.toS) reach = interval;
  }
  return findings;
}

/** D-55 and the window of the figures. */
function runLength(read: Reader): Finding[] {
  const findings: Finding[] = [];
  const [durationS, frequencyHz] = [read.number("run.durationS"), read.number("pwm.frequencyHz")];
  if (
    durationS !== undefined &&
    frequencyHz !== undefined &&
    frequencyHz > 0 &&
    durationS * frequencyHz > PERIODS_MAX * (1 + 1e-12)
  ) {
    const periods = Math.round(durationS * frequencyHz)
      .toLocaleString("en")
      .replaceAll(",", "\u2009");
    const longest = formatQuantity(Math.min(60, PERIODS_MAX / frequencyHz), "s", { digits: 6 }).text;
    findings.push(
      broken(
        "run.durationS",
        "periods",
        `The run has ${periods} PWM periods; enter 1 µs to ${longest} (2 000 000 periods).`,
      ),
    );
  }
  const [fromS, toS] = [read.number("run.window.fromS"), read.number("run.window.toS")];
  if (toS !== undefined && durationS !== undefined && toS > durationS) {
    findings.push(
      broken(
        "run.window.toS",
        "window",
        `The window ends at ${time(toS)}, after the run; enter at most ${time(durationS)}.`,
      ),
    );
  }
  if (fromS !== undefined && toS !== undefined && toS <= fromS) {
    findings.push(
      broken(
        "run.window.fromS",
        "window",
        `The window starts at ${time(fromS)} and ends at ${time(toS)}; enter a start before its end.`,
      ),
    );
  }
  return findings;
}

export const TIME_RULES = [
  (read: Reader) => ascending(read, "command.points", "command point", true),
  (read: Reader) => ascending(read, "load.shaft", "shaft load", false),
  specialIntervals,
  runLength,
];
