// One holder at a time: a file that names the process, trusted only while that very process runs.
import { readFileSync, rmSync, writeFileSync } from "node:fs";
import { isRunning } from "./processes.mjs";

/** When the process began, in clock ticks since boot: with its number it names a process for good. Null where /proc is missing. */
function beganAt(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, "utf8");
    return stat.slice(stat.lastIndexOf(")") + 2).split(" ")[19];
  } catch {
    return null;
  }
}

/** What the lock's holder wrote, or null when nobody holds it (a holder that was killed holds nothing). */
export function readHolder(file) {
  let holder;
  try {
    holder = JSON.parse(readFileSync(file, "utf8"));
  } catch {
    return null; // not there, or cut off while being written
  }
  return isRunning(holder.pid, (pid) => beganAt(pid) === holder.beganAt) ? holder : null;
}

/** Takes the lock, or returns its holder. `note` writes more into it; `release` lets go. */
export function takeLock(file) {
  const mine = { pid: process.pid, beganAt: beganAt(process.pid) };
  for (let attempt = 0; attempt < 2; attempt++) {
    try {
      writeFileSync(file, JSON.stringify(mine), { flag: "wx", mode: 0o600 });
      return {
        note: (facts) => writeFileSync(file, JSON.stringify({ ...mine, ...facts })),
        release: () => rmSync(file, { force: true }),
      };
    } catch (error) {
      if (error.code !== "EEXIST") throw error;
      const holder = readHolder(file);
      if (holder) return { holder };
      rmSync(file, { force: true });
    }
  }
  return { holder: readHolder(file) ?? { pid: 0 } };
}
