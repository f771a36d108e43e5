// Who runs PostgreSQL and where its files stand. It refuses to run as root, so root hands it to another user.
import { createHash } from "node:crypto";
import { chownSync, existsSync, mkdirSync, readFileSync, statSync } from "node:fs";
import { dirname, join } from "node:path";
import { Refusal } from "./messages.mjs";
import { root } from "./paths.mjs";
import { isRoot } from "./programs.mjs";

/** { uid, gid } of the user that runs PostgreSQL when we are root, else null: it runs as ourselves. */
export function findServerUser() {
  if (!isRoot()) return null;
  const users = readFileSync("/etc/passwd", "utf8").split("\n").map((line) => line.split(":"));
  for (const name of ["postgres", "nobody"]) {
    const entry = users.find(([candidate]) => candidate === name);
    if (entry) return { uid: Number(entry[2]), gid: Number(entry[3]) };
  }
  throw new Refusal("PostgreSQL does not run as root, and there is no user 'postgres' to run it as.");
}

/** Whether the user may pass through every folder above `folder`. */
function isReachable(folder, user) {
  for (let above = dirname(folder); ; above = dirname(above)) {
    if (existsSync(above)) {
      const { mode, uid, gid } = statSync(above);
      const mayPass = uid === user.uid ? mode & 0o100 : gid === user.gid ? mode & 0o010 : mode & 0o001;
      if (!mayPass) return false;
    }
    if (above === dirname(above)) return true;
  }
}

/**
 * The folder to use for `wanted`: itself, or one under /var/lib when the user that runs PostgreSQL cannot get there (a
 * checkout below /root). A folder that already holds a database is kept.
 */
export function placeFolder(wanted) {
  const user = findServerUser();
  if (!user || isReachable(wanted, user)) return wanted;
  const elsewhere = join("/var/lib", `slackwater-${createHash("sha256").update(`${root} ${wanted}`).digest("hex").slice(0, 12)}`);
  mkdirSync(elsewhere, { recursive: true, mode: 0o711 });
  return join(elsewhere, "postgres");
}

/** Makes an empty folder that only the server's user may enter. */
export function makeServerFolder(folder, user) {
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  if (user) chownSync(folder, user.uid, user.gid);
}
