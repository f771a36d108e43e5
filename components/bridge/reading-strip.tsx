"use client";

import { useMemo } from "react";
import type { InstantReading } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { readSensing } from "@/components/plot/sensing-facts";
import { fixed } from "@/components/plot/ticks";
import { shuntWords } from "./words";
import styles from "./bridge.module.css";

/** The readings that a phone's bridge has no room for: millivolt of each shunt with its output, and what the converter reads. */
export function ReadingStrip({ reading, document, idealV }: { reading: InstantReading; document: ScenarioDocument; idealV: number | null }) {
  const facts = useMemo(() => readSensing(document), [document]);
  const value = facts.readingTrace === "combinedV" ? reading.combinedV : facts.readingTrace === "differenceV" ? reading.differenceV : null;
  const isWrong = idealV !== null && value !== null && Math.abs(idealV - value) > facts.sampleLimitA * facts.gainRatio * facts.shuntOhm;
  return (
    <dl className={styles.strip}>
      {shuntWords(reading, facts).map((shunt) => {
        const [number, unit] = shunt.across.split(" ");
        return (
          <div key={shunt.name}>
            <dt>{shunt.name}</dt>
            <dd className={styles.figure}>
              {number} <small>{unit}</small>
            </dd>
            <dd>{shunt.output === null ? shunt.flow : <>{shunt.outputName.replace("output", "out")} <b>{shunt.output}</b></>}</dd>
          </div>
        );
      })}
      {value !== null && (
        <div>
          <dt>{facts.readingTrace === "combinedV" ? (facts.isLegSite ? "Combined" : "Output") : "Difference"}</dt>
          <dd className={`${styles.figure} ${isWrong ? styles.bad : ""}`}>
            {fixed(value, 3)} <small>V</small>
          </dd>
          <dd>{idealV === null ? "" : isWrong ? <>should be <b>{fixed(idealV, 3)} V</b></> : "as it should"}</dd>
        </div>
      )}
    </dl>
  );
}
