// The web server: the built application, on the loopback address unless SLACKWATER_HOST says otherwise.
import { tailOf, Refusal } from "./messages.mjs";
import { nextProgram, root, watchedNode } from "./paths.mjs";
import { endGroup, launch, until } from "./processes.mjs";

const READY_WITHIN_MS = 60_000;

/** Starts the server and waits until it says that it is ready, database included. Returns { ended, stop }. */
export async function startWeb({ port, distDir, environment, log, host = process.env.SLACKWATER_HOST ?? "127.0.0.1" }) {
  const env = { ...process.env, NODE_ENV: "production", NEXT_TELEMETRY_DISABLED: "1", SLACKWATER_DIST_DIR: distDir, ...environment };
  const args = [...watchedNode, nextProgram, "start", "-H", host, "-p", String(port)];
  const child = launch(process.execPath, args, { cwd: root, env, log, append: true });
  const isGone = () => child.exitCode !== null || child.signalCode !== null;
  const isReady = await until(async () => isGone() || (await isHealthy(port)), READY_WITHIN_MS);
  if (!isReady || isGone()) {
    await endGroup(child);
    throw new Refusal(`The web server did not become ready (whole log: ${log}):\n${tailOf(log)}`);
  }
  return { ended: child.ended, stop: () => endGroup(child) };
}

async function isHealthy(port) {
  try {
    const response = await fetch(`http://127.0.0.1:${port}/api/health`, { signal: AbortSignal.timeout(5_000) });
    return response.ok;
  } catch {
    return false; // not listening yet: asked again until the time is up
  }
}
