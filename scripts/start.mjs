// `npm start`: database, migrations, demo data, build when stale, web server; then waits, and ends all of it in order.
import { existsSync, readFileSync, renameSync, rmSync, statSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { buildWhenStale, distFolder } from "./build.mjs";
import { databaseEnvironment, ensureDatabase, givenDatabaseEnvironment, migrate, seed } from "./database.mjs";
import { takeLock } from "./lock.mjs";
import { Refusal, reportFailure, say, step } from "./messages.mjs";
import { dataFolder, logFolder, makeDataFolder } from "./paths.mjs";
import { findFreePort, isPortFree } from "./ports.mjs";
import { startPostgres } from "./postgres.mjs";
import { killAll, onStopRequest } from "./processes.mjs";
import { openSecrets } from "./secrets.mjs";
import { startWeb } from "./web.mjs";

const DEFAULT_PORT = 3000;
// a part that ends this often within a minute is not started again
const RESTARTS_PER_MINUTE = 3;
const LOG_LIMIT_BYTES = 8e6;

// the tests of starting and stopping use the build that the other browser tests use
const isForTests = process.env.SLACKWATER_TEST_RUN === "1";
const running = { web: null, database: null };
const beginning = new Set();
let isStopping = false;
let lock = null;

async function start() {
  makeDataFolder();
  lock = takeLock(join(dataFolder, "start.lock"));
  if (lock.holder) {
    const { pid, url } = lock.holder;
    say(url ? `Slackwater is already running at ${url} (process ${pid}).` : `Slackwater is already starting (process ${pid}).`);
    process.exit(0);
  }
  const isDemo = process.env.SLACKWATER_DEMO !== "0";
  const secrets = openSecrets();
  const urls = process.env.DATABASE_URL ? givenDatabaseEnvironment(process.env, secrets) : await startDatabase(secrets);
  await step("migrate", () => migrate(urls));
  if (isDemo) await step("demo data", () => seed(urls));
  await buildWhenStale({ isForTests });
  const port = await chooseWebPort();
  const url = process.env.AUTH_URL ?? `http://localhost:${port}`;
  const environment = {
    ...urls,
    PORT: String(port),
    AUTH_URL: url,
    AUTH_SECRET: process.env.AUTH_SECRET ?? secrets.authSecret,
    SLACKWATER_DEMO: isDemo ? "1" : "0",
    // the server works with the application's role alone
    DATABASE_OWNER_URL: undefined,
  };
  await keepRunning("web", () => startWeb({ port, distDir: distFolder(isForTests), environment, log: openLog("web") }));
  lock.note({ url });
  say(`\nSlackwater is ready at ${url}`);
  if (isDemo) say("Demo accounts are on the sign-in page. Without them: SLACKWATER_DEMO=0 npm start");
  say("Ctrl-C stops it.");
}

async function startDatabase(secrets) {
  const portFile = join(dataFolder, "postgres-port");
  const folder = join(dataFolder, "postgres");
  const log = openLog("postgres");
  await keepRunning("database", () => {
    const port = existsSync(portFile) ? Number(readFileSync(portFile, "utf8")) : undefined;
    return startPostgres({ folder, password: secrets.ownerPassword, log, port });
  });
  writeFileSync(portFile, String(running.database.port));
  await ensureDatabase(running.database, secrets, "slackwater");
  return databaseEnvironment(running.database, secrets, "slackwater");
}

/** Starts a part and starts it again when it ends by itself; gives up, and stops all, when that happens too often. */
async function keepRunning(name, begin, endings = []) {
  const begun = begin().then((part) => (running[name] = part));
  beginning.add(begun);
  await begun.finally(() => beginning.delete(begun));
  running[name].ended.then(async (how) => {
    if (isStopping) return;
    const recent = [...endings.filter((at) => at > Date.now() - 60_000), Date.now()];
    const reason = how?.signal ?? (how?.code === undefined ? "" : `exit code ${how.code}`);
    say(`The ${name} server ended by itself${reason && ` (${reason})`}; see ${logFolder}.`);
    if (recent.length > RESTARTS_PER_MINUTE) return stop(1);
    try {
      await keepRunning(name, begin, recent);
      say(`The ${name} server runs again.`);
    } catch (error) {
      reportFailure(error);
      await stop(1);
    }
  });
}

async function chooseWebPort() {
  const asked = process.env.PORT ? Number(process.env.PORT) : null;
  if (asked !== null && !(Number.isInteger(asked) && asked > 0 && asked < 65536)) throw new Refusal(`PORT must be a whole number from 1 to 65535, not '${process.env.PORT}'.`);
  if (asked !== null && !(await isPortFree(asked))) throw new Refusal(`Port ${asked} is taken by another program. Choose another: PORT=3001 npm start`);
  if (asked !== null) return asked;
  const port = await findFreePort(DEFAULT_PORT);
  if (port !== DEFAULT_PORT) say(`Port ${DEFAULT_PORT} is taken by another program; using ${port}.`);
  return port;
}

/** The log of a part; one that grew large is put aside first. */
function openLog(name) {
  const file = join(logFolder, `${name}.log`);
  if (existsSync(file) && statSync(file).size > LOG_LIMIT_BYTES) {
    rmSync(`${file}.old`, { force: true });
    renameSync(file, `${file}.old`);
  }
  return file;
}

/** Web first, so that nothing asks the database any more; then the database. */
async function stop(exitCode) {
  if (isStopping) return;
  isStopping = true;
  try {
    await running.web?.stop();
    killAll();
    // a part that was just being started is there in a moment, or has failed
    await Promise.allSettled(beginning);
    await running.database?.stop();
    lock?.release?.();
  } catch (error) {
    reportFailure(error);
    exitCode = 1;
  }
  process.exit(exitCode);
}

onStopRequest((reason) => {
  if (reason !== "SIGHUP") say("\nStopping ...");
  void stop(0);
});

start().catch(async (error) => {
  if (isStopping) return;
  reportFailure(error);
  await stop(1);
});
