import type { Band, Conduction } from "@/lib/engine/results";
import type { Paint } from "./painter";
import type { PlotWindow } from "./scale";

/** Short words for the strip's readout; the long ones are in components/bridge/words.ts. */
export const CONDUCTION_SHORT: Record<Conduction, string> = {
  driveForward: "Drive, forward",
  driveReverse: "Drive, reverse",
  returnToSupply: "Return to supply",
  recirculateLow: "Recirculation, low",
  recirculateHigh: "Recirculation, high",
  deadTime: "Dead time",
  coasting: "Coasting",
  shootThrough: "Shoot-through",
};

/** Full strength, in the strip. `null` leaves the paper. */
export const STRIP_PAINT: Record<Conduction, Paint | null> = {
  driveForward: { pattern: "driveForward" },
  driveReverse: { pattern: "driveReverse" },
  returnToSupply: { pattern: "returnToSupply" },
  recirculateLow: null,
  recirculateHigh: { pattern: "recirculateHigh" },
  deadTime: { color: "ink" },
  coasting: { pattern: "coasting" },
  shootThrough: { color: "fault" },
};

/** In the lanes: flat tints only. Hatches under the water lines made the return bands shimmer at one device pixel per CSS pixel. */
export const LANE_PAINT: Record<Conduction, Paint | null> = {
  driveForward: { color: "fwdTint", opacity: 0.62 },
  driveReverse: { color: "revTint", opacity: 0.62 },
  returnToSupply: { color: "ink", opacity: 0.075 },
  recirculateLow: null,
  recirculateHigh: null,
  deadTime: { color: "ink", opacity: 0.13 },
  coasting: { color: "ink", opacity: 0.035 },
  shootThrough: { color: "faultTint", opacity: 0.9 },
};

export function bandAt(bands: readonly Band[], timeS: number): Band | null {
  let low = 0;
  let high = bands.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (bands[middle]!.toS <= timeS) low = middle + 1;
    else high = middle;
  }
  const band = bands[low];
  if (band !== undefined && band.fromS <= timeS) return band;
  const last = bands[bands.length - 1];
  return last !== undefined && timeS === last.toS ? last : null;
}

export const bandsIn = (bands: readonly Band[], window: PlotWindow): Band[] =>
  bands.filter((band) => band.toS > window.fromS && band.fromS < window.toS);

/** Neighbours of the same conduction as one, so that a change of a leg alone draws no seam. Bands follow one another without gaps. */
export function mergeBands(bands: readonly Band[]): { fromS: number; toS: number; conduction: Conduction }[] {
  const merged: { fromS: number; toS: number; conduction: Conduction }[] = [];
  for (const band of bands) {
    const last = merged[merged.length - 1];
    if (last !== undefined && last.conduction === band.conduction) last.toS = band.toS;
    else merged.push({ fromS: band.fromS, toS: band.toS, conduction: band.conduction });
  }
  return merged;
}

const MAIN_ORDER: readonly Conduction[] = [
  "driveForward",
  "driveReverse",
  "returnToSupply",
  "recirculateHigh",
  "coasting",
  "shootThrough",
  "deadTime",
  "recirculateLow",
];

export type BandShare = { conduction: Conduction; from: number; to: number };

/** What part of an interval each conduction takes, stacked from 0 to 1: the strip when single bands are too narrow to see. */
export function bandShares(bands: readonly Band[], fromS: number, toS: number): BandShare[] {
  const sums = new Map<Conduction, number>();
  for (const band of bands) {
    const overlapS = Math.min(band.toS, toS) - Math.max(band.fromS, fromS);
    if (overlapS > 0) sums.set(band.conduction, (sums.get(band.conduction) ?? 0) + overlapS);
  }
  const shares: BandShare[] = [];
  let from = 0;
  for (const conduction of MAIN_ORDER) {
    const sumS = sums.get(conduction);
    if (sumS === undefined) continue;
    const to = from + sumS / (toS - fromS);
    shares.push({ conduction, from, to });
    from = to;
  }
  return shares;
}

/** Bands narrower than this on average are not told apart by eye, so the strip shows shares and the lanes stay blank. */
export const LEAST_BAND_PX = 3;
