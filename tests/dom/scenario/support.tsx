import { configure, render } from "@testing-library/react";
import { AppRouterContext, type AppRouterInstance } from "next/dist/shared/lib/app-router-context.shared-runtime";
import type { ReactNode } from "react";
import { vi } from "vitest";
import type { DraftStorage, KeptInBrowser } from "@/components/scenario/draft-keeper";
import { ScenarioProvider, useWorkbench } from "@/components/scenario/provider";
import type { ScenarioActions } from "@/components/scenario/scenario-actions";
import type { InitialScenario } from "@/components/scenario/scenario-state";
import type { ScenarioStore } from "@/components/scenario/store";
import { parseScenario, type ScenarioDocument } from "@/lib/scenario/schema";
import { baseDocument } from "@/tests/support/oracle/base-document";
import { EngineTasks } from "@/workers/engine-tasks";
import type { EngineClient } from "@/workers/protocol";

// the first drawing in a cold jsdom on a busy machine takes seconds
vi.setConfig({ testTimeout: 30_000 });
configure({ asyncUtilTimeout: 8_000 });

/** Where the page went, instead of going there. */
export const router = {
  push: vi.fn(),
  replace: vi.fn(),
  refresh: vi.fn(),
  back: vi.fn(),
  forward: vi.fn(),
  prefetch: vi.fn(),
};
/** Next's navigation as components of the app find it. */
export const WithRouter = ({ children }: { children: ReactNode }) => (
  <AppRouterContext.Provider value={router as unknown as AppRouterInstance}>{children}</AppRouterContext.Provider>
);

/** A short run with a reversal, so that a test's run takes milliseconds. */
export function shortDocument(change: (document: ScenarioDocument) => void = () => undefined): ScenarioDocument {
  const document = structuredClone(baseDocument());
  document.title = "Sluice gate, reversal";
  document.command.points = [
    { timeS: 0, duty: 0.53, ramp: "step" },
    { timeS: 0.0004, duty: -0.31, ramp: "step" },
  ];
  document.run = { durationS: 0.001 };
  change(document);
  const parsed = parseScenario(document);
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.findings));
  return parsed.document;
}

export const initialOf = (document: ScenarioDocument, change: Partial<InitialScenario> = {}): InitialScenario => ({
  scenarioId: "11111111-1111-4111-8111-111111111111",
  personId: "22222222-2222-4222-8222-222222222222",
  mode: "edit",
  title: document.title,
  tags: ["gate"],
  revisionState: "draft",
  base: { number: 7, document, savedAtMs: Date.UTC(2026, 4, 4, 14, 2), authorName: "Ama Lindqvist" },
  ...change,
});

/** The worker's own tasks, called in place: the same engine, without the thread. */
export function directClient(): EngineClient {
  const tasks = new EngineTasks(
    () => new Promise((resolve) => setTimeout(resolve)),
    () => performance.now(),
  );
  return {
    run: (request, onProgress) => tasks.run(request, onProgress),
    view: (request) => Promise.resolve(tasks.view(request)),
    readAt: (times) => Promise.resolve(tasks.readAt(times)),
    cancel: () => tasks.cancel(),
    dispose: () => tasks.cancel(),
  };
}

/** A browser's storage in memory. */
export function memoryStorage(): DraftStorage & { kept: Map<string, KeptInBrowser> } {
  const kept = new Map<string, KeptInBrowser>();
  return {
    kept,
    read: (key) => Promise.resolve(structuredClone(kept.get(key))),
    write: (key, value) => Promise.resolve(void kept.set(key, structuredClone(value))),
    remove: (key) => Promise.resolve(void kept.delete(key)),
  };
}

type Options = {
  document?: ScenarioDocument;
  initial?: Partial<InitialScenario>;
  actions?: Partial<ScenarioActions>;
  client?: () => EngineClient;
  storage?: DraftStorage;
};

/** Draws `children` inside a scenario; `store` is the page's own. */
export function renderScenario(children: ReactNode, options: Options = {}) {
  const held: { store: ScenarioStore | null } = { store: null };
  const Hold = () => {
    held.store = useWorkbench().store;
    return null;
  };
  const client = options.client ?? directClient;
  const rendered = render(
    <WithRouter>
      <ScenarioProvider
        initial={initialOf(options.document ?? shortDocument(), options.initial)}
        actions={options.actions ?? {}}
        createClient={client}
        storage={options.storage ?? memoryStorage()}
      >
        <Hold />
        {children}
      </ScenarioProvider>
    </WithRouter>,
  );
  if (!held.store) throw new Error("no store");
  return { ...rendered, store: held.store };
}
