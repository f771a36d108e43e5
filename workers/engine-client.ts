import { proxy, wrap, type Remote } from "comlink";
import type { EngineTasks } from "./engine-tasks";
import type { EngineClient, EngineFailure, Outcome } from "./protocol";

const failed = (failure: EngineFailure): Outcome<never> => ({ ok: false, failure });

/**
 * The engine in its own thread. If the worker ends or cannot start, every open request is answered with a failure that
 * says so; nothing falls back silently.
 */
export function createEngineClient(): EngineClient {
  const worker = new Worker(new URL("./engine.worker.ts", import.meta.url), { type: "module", name: "engine" });
  const remote: Remote<EngineTasks> = wrap<EngineTasks>(worker);
  const open = new Set<(outcome: Outcome<never>) => void>();
  let brokenText = "";

  const breakAll = (text: string) => {
    brokenText = text;
    for (const answer of open) answer(failed({ code: "engine.failed", text }));
    open.clear();
  };
  worker.addEventListener("error", (event) => breakAll(`The computing thread stopped (${event.message || "it could not be started"}). Reload the page; unsaved work is kept.`));

  function ask<T>(request: Promise<Outcome<T>>): Promise<Outcome<T>> {
    if (brokenText) return Promise.resolve(failed({ code: "engine.failed", text: brokenText }));
    return new Promise((resolve) => {
      const answer = (outcome: Outcome<T>) => {
        open.delete(answer);
        resolve(outcome);
      };
      open.add(answer);
      request.then(answer, (error: unknown) => answer(failed({ code: "engine.failed", text: error instanceof Error ? error.message : String(error) })));
    });
  }

  return {
    run: (request, onProgress) => ask(remote.run(request, onProgress ? proxy(onProgress) : undefined) as Promise<Outcome<never>>),
    view: (request) => ask(remote.view(request) as Promise<Outcome<never>>),
    readAt: (times) => ask(remote.readAt(times) as Promise<Outcome<never>>),
    cancel: () => void remote.cancel(),
    dispose: () => {
      breakAll("The page was left.");
      worker.terminate();
    },
  };
}
