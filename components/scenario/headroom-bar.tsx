"use client";

import { readSensing } from "@/components/plot/sensing-facts";
import { extentOf } from "@/components/plot/values";
import { formatQuantity } from "@/lib/units/format";
import { useScenario } from "./provider";
import styles from "./figures.module.css";

const WIDTH = 212;

/** How much of its span the output that the converter reads uses: forward part solid, reverse part teal, midscale dash-dot. */
export function HeadroomBar() {
  const shown = useScenario((state) => state.shown);
  if (!shown) return null;
  const facts = readSensing(shown.document);
  const { window } = shown.simulation;
  const names =
    facts.readingTrace === "outAV" && facts.isLegSite ? (["outAV", "outBV"] as const) : [facts.readingTrace];
  const extents = names.flatMap((name) => extentOf(shown.overview, name, window) ?? []);
  if (extents.length === 0) return null;
  const isDifference = facts.readingTrace === "differenceV";
  const topV = facts.outputMaxV;
  const bottomV = isDifference ? facts.outputMinV - facts.outputMaxV : facts.outputMinV;
  const restV =
    facts.readingTrace === "combinedV" && facts.referenceV !== null
      ? facts.referenceV
      : isDifference
        ? 0
        : facts.outputMinV;
  const low = Math.min(...extents.map((extent) => extent.min));
  const high = Math.max(...extents.map((extent) => extent.max));
  const x = (value: number) => (WIDTH * (Math.min(topV, Math.max(bottomV, value)) - bottomV)) / (topV - bottomV);
  const volt = (value: number) => formatQuantity(Math.max(0, value), "V", { digits: 3 }).text;
  const below = volt(low - bottomV);
  const above = volt(topV - high);
  const isTwoSided = restV > bottomV;
  return (
    <dd>
      <svg
        className={styles.bar}
        viewBox={`0 0 ${WIDTH} 18`}
        role="img"
        aria-label={`The output uses ${volt(low - bottomV)} above its floor to ${above} below its ceiling`}
      >
        <path d={`M0 9.5H${WIDTH}`} stroke="var(--ink)" />
        <path d={`M.5 4V15M${WIDTH - 0.5} 4V15`} stroke="var(--ink)" />
        {low < restV && (
          <rect x={x(low)} y="5" width={x(restV) - x(low)} height="9" fill="var(--rev-fill)" stroke="var(--rev)" />
        )}
        {high > restV && (
          <rect x={x(restV)} y="5" width={x(high) - x(restV)} height="9" fill="var(--fwd-fill)" stroke="var(--fwd)" />
        )}
        {isTwoSided && (
          <path d={`M${x(restV)} 1V18`} stroke="var(--ref)" strokeWidth="1.4" strokeDasharray="5 2 1.5 2" />
        )}
      </svg>
      <span className={styles.ends}>
        <span>{isTwoSided ? `${below} below` : ""}</span>
        <span>{above} above</span>
      </span>
    </dd>
  );
}
