// What the scripts print. One line per step, plain words, the time a step took.
import { readFileSync } from "node:fs";

/** A failure whose text is for the person at the terminal: printed without a stack. */
export class Refusal extends Error {}

export const say = (text) => process.stdout.write(`${text}\n`);

/** Runs a step and prints its name with the seconds it took, when it took long enough to notice. */
export async function step(name, work) {
  const started = performance.now();
  const result = await work();
  const seconds = (performance.now() - started) / 1000;
  if (seconds > 0.5) say(`  ${name}: ${seconds.toFixed(1)} s`);
  return result;
}

/** The last lines of a log, for the message that says what went wrong. */
export function tailOf(file, lineCount = 25) {
  try {
    return readFileSync(file, "utf8").trimEnd().split("\n").slice(-lineCount).join("\n");
  } catch (error) {
    return `(no log at ${file}: ${error.code})`;
  }
}

export function reportFailure(error) {
  process.stderr.write(`\n${error instanceof Refusal ? error.message : (error?.stack ?? error)}\n`);
}
