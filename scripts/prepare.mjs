// Before `npm start` and `npm test`: makes sure that packages and programs are there. Uses nothing but Node.js itself.
import { join } from "node:path";
import { readHolder } from "./lock.mjs";
import { Refusal, reportFailure } from "./messages.mjs";
import { installPackages } from "./packages.mjs";
import { dataFolder, makeDataFolder } from "./paths.mjs";
import { killAll, onStopRequest } from "./processes.mjs";
import { requirePrograms } from "./programs.mjs";

const isForTests = process.argv.includes("--test");

async function prepare() {
  const [major, minor] = process.versions.node.split(".").map(Number);
  if (major < 20 || (major === 20 && minor < 19)) throw new Refusal(`Slackwater needs Node.js 20.19 or newer; this is ${process.versions.node}.`);
  makeDataFolder();
  // a running server keeps its packages; `start` says where it runs
  if (!isForTests && readHolder(join(dataFolder, "start.lock"))) return;
  const programs = isForTests ? ["postgresql", "chromium"] : process.env.DATABASE_URL ? [] : ["postgresql"];
  await requirePrograms(programs);
  await installPackages();
}

onStopRequest(() => {
  killAll();
  process.exit(130);
});

prepare().catch((error) => {
  reportFailure(error);
  process.exit(1);
});
