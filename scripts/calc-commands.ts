import { readFileSync } from "node:fs";
import { simulate } from "@/lib/engine/index";
import type { Finding } from "@/lib/result";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { upgradeScenario } from "@/lib/scenario/upgrade";

/** The command line without its process: arguments and two writers in, exit status out. */

export type CalcOutput = { out: (text: string) => void; err: (text: string) => void };

/** Exit statuses: the document or a time was refused; the command line itself cannot be read. */
export const EXIT_REFUSED = 2;
export const EXIT_USAGE = 1;

class UsageError extends Error {}
class RefusedError extends Error {
  constructor(readonly findings: readonly Finding[]) {
    super("refused");
  }
}

type Options = Readonly<Record<string, string>>;
type CalcCommand = {
  usage: string;
  summary: string;
  options: readonly string[];
  run(document: ScenarioDocument, options: Options): unknown;
};

/** Seconds, separated by commas; refused outside the run (D-27). */
function timesOf(given: string | undefined, durationS: number): number[] {
  if (given === undefined) return [];
  const times = given.split(",").map((part) => (part.trim() === "" ? NaN : Number(part)));
  if (times.some((time) => !Number.isFinite(time)))
    throw new UsageError(
      `--at takes seconds separated by commas, such as 0.001,0.002; it was ${JSON.stringify(given)}.`,
    );
  const outside = times.filter((time) => time < 0 || time > durationS);
  if (outside.length === 0) return times;
  throw new RefusedError(
    outside.map((time) => ({
      path: "at",
      code: "at.outside",
      text: `${time} s is outside the run; enter 0 s to ${durationS} s.`,
    })),
  );
}

/** One entry for each command; a new one needs nothing else. */
const COMMANDS: Readonly<Record<string, CalcCommand>> = {
  simulate: {
    usage: "simulate FILE [--at 0.001,0.002]",
    summary: "runs a scenario document and prints figures, samples, events, notices and the instants asked for",
    options: ["--at"],
    run: (document, options) => simulate(document, { at: timesOf(options["--at"], document.run.durationS) }),
  },
};

export const USAGE = [
  "usage: npm run -s calc -- COMMAND ...",
  ...Object.values(COMMANDS).map(({ usage, summary }) => `  ${usage}\n      ${summary}`),
  "FILE is a scenario document in JSON, or - for standard input. The result is JSON on standard output.",
  `Exit status: 0 done, ${EXIT_REFUSED} document refused (problems with their paths on standard error), ${EXIT_USAGE} command line not understood.`,
  "",
].join("\n");

function readText(file: string): string {
  try {
    return readFileSync(file === "-" ? 0 : file, "utf8").replace(/^\uFEFF/, "");
  } catch (cause) {
    throw new UsageError(`cannot read ${file}: ${(cause as NodeJS.ErrnoException).code ?? "unknown reason"}.`, {
      cause,
    });
  }
}

function readDocument(file: string): ScenarioDocument {
  const text = readText(file);
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch (cause) {
    throw new RefusedError([{ path: "", code: "json", text: `The file is not JSON: ${(cause as Error).message}.` }]);
  }
  const parsed = upgradeScenario(value);
  if (!parsed.ok) throw new RefusedError(parsed.findings);
  return parsed.document;
}

function readArguments(args: readonly string[]): { command: CalcCommand; file: string; options: Options } {
  const [name, ...rest] = args;
  const command = name !== undefined && Object.hasOwn(COMMANDS, name) ? COMMANDS[name] : undefined;
  if (!command)
    throw new UsageError(name === undefined ? "a command is missing." : `${JSON.stringify(name)} is no command.`);
  const files: string[] = [];
  const options: Record<string, string> = {};
  for (let index = 0; index < rest.length; index += 1) {
    const word = rest[index];
    if (!word.startsWith("--")) {
      files.push(word);
      continue;
    }
    const [option, inline] = word.split(/=(.*)/s);
    if (!command.options.includes(option)) throw new UsageError(`${name} has no option ${option}.`);
    const value = inline ?? rest[(index += 1)];
    if (value === undefined) throw new UsageError(`${option} needs a value.`);
    options[option] = value;
  }
  if (files.length !== 1) throw new UsageError(`${name} takes one file.`);
  return { command, file: files[0], options };
}

/** Runs one command. @returns the exit status of the process */
export function runCalc(args: readonly string[], { out, err }: CalcOutput): number {
  if (args.length === 1 && (args[0] === "--help" || args[0] === "-h")) {
    out(USAGE);
    return 0;
  }
  try {
    const { command, file, options } = readArguments(args);
    out(`${JSON.stringify(command.run(readDocument(file), options))}\n`);
    return 0;
  } catch (error) {
    if (error instanceof RefusedError) {
      for (const { path, text } of error.findings) err(path === "" ? `${text}\n` : `${path}: ${text}\n`);
      return EXIT_REFUSED;
    }
    if (!(error instanceof UsageError)) throw error;
    err(`calc: ${error.message}\n${USAGE}`);
    return EXIT_USAGE;
  }
}
