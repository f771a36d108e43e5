"use client";

import { useMemo, useRef } from "react";
import type { Band, InstantReading } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { readSensing } from "@/components/plot/sensing-facts";
import { useSize } from "@/components/plot/use-size";
import { LoadSymbol, SupplyBox } from "./boxes";
import { Channels } from "./channels";
import { flowOf } from "./flow";
import { MEDIUM, PHONE, ribbonsOf, WIDE } from "./geometry";
import { OutputGauge, ReadingColumn, ShuntNames, ShuntReadings } from "./readings";
import { RibbonShape } from "./ribbon";
import { ShuntStaff, staffPlaces } from "./staffs";
import { Switches } from "./switches";
import { describeState, directionWord, type Gates } from "./words";
import styles from "./bridge.module.css";

/**
 * The bridge at one instant: which switches are on, where the current runs and how much, what each shunt and output shows. Drawn from
 * `reading` alone; `band` (the conduction band of the instant, from the view) adds the gates and the name of the state. `fullScaleA` is the
 * current of the widest ribbon. `idealV`: what the output should read; where it does not, the gauge says so. The drawing has one text
 * alternative; the events table lists the same step by step.
 */
export type BridgeProps = {
  reading: InstantReading;
  band?: Pick<Band, "conduction" | "gates"> | null;
  document: ScenarioDocument;
  fullScaleA: number;
  idealV?: number | null;
  isPhone?: boolean;
  isStale?: boolean;
};

const LEAST_TEXT_PX = 10.5;
/** Below this the wide drawing's words would meet at their least size. */
const MEDIUM_BELOW_PX = 480;

const gatesOf = (reading: InstantReading): Gates => ({
  highA: reading.state.A === "high channel",
  lowA: reading.state.A === "low channel",
  highB: reading.state.B === "high channel",
  lowB: reading.state.B === "low channel",
});

export function Bridge({ reading, band = null, document, fullScaleA, idealV = null, isPhone = false, isStale = false }: BridgeProps) {
  const ref = useRef<HTMLDivElement>(null);
  const size = useSize(ref, { width: WIDE.width, height: WIDE.height });
  const isMedium = !isPhone && size.width < MEDIUM_BELOW_PX;
  const geometry = isPhone ? PHONE : isMedium ? MEDIUM : WIDE;
  const facts = useMemo(() => readSensing(document), [document]);
  const words = describeState(reading, facts, fullScaleA, band);
  const direction = directionWord(reading.motorCurrentA, fullScaleA * 0.005);
  const scale = Math.min(size.width / geometry.width, size.height > 0 ? size.height / geometry.height : Infinity);
  // Text never falls under 10.5 px on screen: at a small scale it grows in the drawing's own units.
  const textSize = (nominal: number) => Math.max(nominal, LEAST_TEXT_PX / Math.max(0.5, scale));
  const xm = (geometry.xA + geometry.xB) / 2;
  const isTopLabelled = isPhone && facts.site === "legTop";
  const titleY = geometry.yTop + (isTopLabelled ? 56 : 32);
  return (
    <div ref={ref} className={styles.bridge} data-stale={isStale || undefined}>
      <svg viewBox={`0 0 ${geometry.width} ${geometry.height}`} role="img" aria-label={words.sentence} preserveAspectRatio="xMinYMid meet">
        <Channels geometry={geometry} />
        {ribbonsOf(geometry, flowOf(reading)).map((ribbon) => (
          <RibbonShape key={ribbon.kind} ribbon={ribbon} fullScaleA={fullScaleA} geometry={geometry} />
        ))}
        <Switches geometry={geometry} gates={band?.gates ?? gatesOf(reading)} states={reading.state} textSize={textSize} />
        {staffPlaces(geometry, facts.site).map((place) => (
          <ShuntStaff key={place.leg ?? "one"} place={place} />
        ))}
        {!isMedium && <ShuntNames geometry={geometry} facts={facts} textSize={textSize} />}
        {isMedium && <ReadingColumn geometry={geometry} reading={reading} facts={facts} textSize={textSize} />}
        {!isPhone && !isMedium && <ShuntReadings geometry={geometry} reading={reading} facts={facts} textSize={textSize} />}
        {!isPhone && <OutputGauge geometry={geometry} reading={reading} facts={facts} textSize={textSize} idealV={idealV} />}
        <LoadSymbol geometry={geometry} kind={document.load.kind} currentA={reading.motorCurrentA} direction={direction} textSize={textSize} />
        <SupplyBox geometry={geometry} busV={reading.busV} hasCapacitor={document.supply.busCapacitanceF > 0} word={words.supply} textSize={textSize} />
        <text x={xm} y={titleY} textAnchor="middle" className={styles.numeral} fontSize={17}>
          {words.title}
        </text>
        <text x={xm} y={titleY + 4 + textSize(11)} textAnchor="middle" className={styles.plain} fontSize={textSize(11)}>
          {words.who}
        </text>
      </svg>
    </div>
  );
}
