"use client";

import { useRef, useState, type ReactNode } from "react";
import { createEngineClient } from "@/workers/engine-client";
import type { EngineClient } from "@/workers/protocol";
import { Banners } from "./banners";
import { DeskLayout } from "./desk-layout";
import type { DraftStorage } from "./draft-keeper";
import { PhoneLayout } from "./phone-layout";
import { ProgressBorder } from "./progress-border";
import { ScenarioProvider } from "./provider";
import { SaidLine } from "./said";
import type { ScenarioActions } from "./scenario-actions";
import type { InitialScenario } from "./scenario-state";
import { useLayout } from "./use-layout";
import { usePageKeys } from "./use-page-keys";
import { WorkbenchDialogs, type Opened } from "./workbench-dialogs";
import { WorkbenchFoot } from "./workbench-foot";
import { WorkbenchHead } from "./workbench-head";
import styles from "./workbench.module.css";

export type ScenarioWorkbenchProps = {
  initial: InitialScenario;
  actions?: Partial<ScenarioActions>;
  mayDuplicate?: boolean;
  isArchived?: boolean;
  /** The button that shares; the page knows how. */
  share?: ReactNode;
  createClient?: () => EngineClient;
  storage?: DraftStorage;
};

/** The whole job on one page: inputs, bridge, waveforms, figures and notices, live as values change. */
export function ScenarioWorkbench({
  initial,
  actions,
  createClient = createEngineClient,
  storage,
  ...rest
}: ScenarioWorkbenchProps) {
  return (
    <ScenarioProvider
      initial={initial}
      createClient={createClient}
      {...(actions ? { actions } : {})}
      {...(storage ? { storage } : {})}
    >
      <Workbench {...rest} />
    </ScenarioProvider>
  );
}

type WorkbenchProps = Pick<ScenarioWorkbenchProps, "mayDuplicate" | "isArchived" | "share">;

function Workbench({ mayDuplicate = false, isArchived = false, share }: WorkbenchProps) {
  const [opened, setOpened] = useState<Opened | null>(null);
  const root = useRef<HTMLDivElement>(null);
  const layout = useLayout();
  usePageKeys(root, opened, setOpened);
  return (
    <div className={styles.place}>
      <div ref={root} className={styles.workbench} data-layout={layout}>
        <WorkbenchHead onOpen={setOpened} mayDuplicate={mayDuplicate} share={share} isPhone={layout === "phone"} />
        <ProgressBorder />
        <div className={styles.banners}>
          <Banners onOpen={setOpened} mayDuplicate={mayDuplicate} isArchived={isArchived} />
        </div>
        {layout === "phone" ? <PhoneLayout /> : <DeskLayout isNarrow={layout === "narrow"} />}
        {layout !== "phone" && <WorkbenchFoot />}
        <SaidLine />
        <WorkbenchDialogs opened={opened} onClose={() => setOpened(null)} />
      </div>
    </div>
  );
}
