import { runCalc } from "./calc-commands";

// The status is set rather than forced, so that a pipe takes all of the output before the process ends.
process.exitCode = runCalc(process.argv.slice(2), {
  out: (text) => process.stdout.write(text),
  err: (text) => process.stderr.write(text),
});
