"use client";

import { createEngineClient } from "@/workers/engine-client";
import type { EngineClient } from "@/workers/protocol";
import { resolveInput, type QuantityInput } from "@/lib/scenario/inputs";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { ScenarioProvider, useScenario } from "./provider";
import { QuantityRow } from "./quantity-row";
import { BridgeNow, Lanes, NoRunYet, StripNow } from "./run-region";
import { useLayout } from "./use-layout";
import styles from "./live-example.module.css";

const LANES_PX = 300;
/** Duty before and after the reversal, the shunt: what decides how the reading looks. */
const TUNED = [
  { path: "command.points.0.duty", label: "Duty before" },
  { path: "command.points.1.duty", label: "Duty after" },
  { path: "sensing.shunt.resistanceOhm", label: "Shunt value" },
];

/** A small scenario that runs in the page: nothing to sign in to, nothing kept. */
export function LiveExample({
  document,
  createClient = createEngineClient,
}: {
  document: ScenarioDocument;
  createClient?: () => EngineClient;
}) {
  const base = { number: 1, document, savedAtMs: 0, authorName: "" };
  return (
    <ScenarioProvider
      createClient={createClient}
      initial={{ scenarioId: null, personId: null, mode: "guest", title: document.title, tags: [], base }}
    >
      <Example />
    </ScenarioProvider>
  );
}

function Example() {
  const shown = useScenario((state) => state.shown);
  const isPhone = useLayout() === "phone";
  return (
    <section className={styles.example} aria-label="Live example">
      <div className={styles.inputs}>
        {TUNED.map((one) => (
          <Tuned key={one.path} {...one} />
        ))}
      </div>
      {shown ? (
        <>
          <div className={styles.bridge}>
            <BridgeNow shown={shown} isPhone={isPhone} />
            {isPhone && <StripNow shown={shown} />}
          </div>
          <div className={styles.lanes}>
            <Lanes shown={shown} lanes={["conduction", "motor", "combined"]} heightPx={LANES_PX} />
          </div>
        </>
      ) : (
        <NoRunYet />
      )}
    </section>
  );
}

function Tuned({ path, label }: { path: string; label: string }) {
  const document = useScenario((state) => state.document);
  const input = resolveInput(path, document);
  return input?.kind === "quantity" ? <QuantityRow input={input satisfies QuantityInput} label={label} /> : null;
}
