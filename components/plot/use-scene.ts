"use client";

import { useMemo, useState } from "react";
import type { View } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { availableLanes, defaultLaneIds, type LaneId } from "./lanes";
import { laneDomains, layoutLanes } from "./layout";
import type { PlotWindow } from "./scale";
import { buildScene } from "./scene";
import { readSensing } from "./sensing-facts";
import type { Domain } from "./ticks";

type SceneInput = {
  view: View;
  overview: View | undefined;
  document: ScenarioDocument;
  viewWindow: PlotWindow;
  laneIds: readonly LaneId[] | null;
  width: number;
  height: number;
  isCompact: boolean;
  isHeld: boolean;
};

const isSame = (one: Map<LaneId, Domain>, other: Map<LaneId, Domain>): boolean =>
  one.size === other.size && [...one].every(([id, domain]) => other.get(id)?.min === domain.min && other.get(id)?.max === domain.max);

/** Works out the static picture; it changes only with run, window, size, lanes or document, never with the cursor. */
export function useScene(input: SceneInput) {
  const { view, overview, document, viewWindow, laneIds, width, height, isCompact, isHeld } = input;
  const facts = useMemo(() => readSensing(document), [document]);
  const available = useMemo(() => availableLanes(facts, view), [facts, view]);
  const shown = useMemo(() => {
    const wanted = laneIds ?? defaultLaneIds(facts, isCompact);
    return available.filter((lane) => wanted.includes(lane.id)).map((lane) => lane.id);
  }, [available, facts, laneIds, isCompact]);
  const lanes = useMemo(() => available.filter((lane) => shown.includes(lane.id)), [available, shown]);
  const [domains, setDomains] = useState<Map<LaneId, Domain>>(() => new Map());
  const wanted = useMemo(() => laneDomains(lanes, [view, overview], facts, domains, isHeld), [lanes, view, overview, facts, domains, isHeld]);
  if (!isSame(domains, wanted)) setDomains(wanted);
  const layout = useMemo(() => layoutLanes(lanes, wanted, width, height, isCompact), [lanes, wanted, width, height, isCompact]);
  const scene = useMemo(() => buildScene(view, facts, layout, viewWindow), [view, facts, layout, viewWindow]);
  return { scene, available, shown };
}
