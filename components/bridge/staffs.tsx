import { CHANNEL, type BridgeGeometry } from "./geometry";
import type { SensingFacts } from "@/components/plot/sensing-facts";

export type StaffPlace = { leg: "A" | "B" | null; x: number; y: number; isLevel: boolean };

const LENGTH = 30;
const BREADTH = 6;

/** Where the shunts of a site stand: centre of the staff and whether it lies along a level channel. */
export function staffPlaces(g: BridgeGeometry, site: SensingFacts["site"]): StaffPlace[] {
  const bank = CHANNEL / 2;
  if (site === "legTop" || site === "legBottom") {
    const y = site === "legTop" ? g.yTopStaff : g.yBottomStaff;
    return [
      { leg: "A", x: g.xA - bank - BREADTH / 2, y, isLevel: false },
      { leg: "B", x: g.xB + bank + BREADTH / 2, y, isLevel: false },
    ];
  }
  const middle = (g.xSupply + g.xA) / 2;
  if (site === "line") return [{ leg: null, x: (g.xA + (g.xA + g.xB) / 2 - g.motorRadius) / 2 + 2, y: g.yMid + bank + BREADTH / 2, isLevel: true }];
  return [{ leg: null, x: middle, y: site === "supply" ? g.yTop + bank + BREADTH / 2 : g.yBottom - bank - BREADTH / 2, isLevel: true }];
}

/** A shunt: a graduated staff on the bank of its stretch of channel. */
export function ShuntStaff({ place }: { place: StaffPlace }) {
  const piece = LENGTH / 5;
  return (
    <g>
      {[0, 1, 2, 3, 4].map((index) => {
        const along = -LENGTH / 2 + index * piece;
        return (
          <rect
            key={index}
            x={place.isLevel ? place.x + along : place.x - BREADTH / 2}
            y={place.isLevel ? place.y - BREADTH / 2 : place.y + along}
            width={place.isLevel ? piece : BREADTH}
            height={place.isLevel ? BREADTH : piece}
            fill={index % 2 === 0 ? "var(--ink)" : "var(--sheet)"}
            stroke="var(--ink)"
            strokeWidth="0.8"
          />
        );
      })}
    </g>
  );
}

export type GaugeProps = { x: number; y: number; width: number; height: number; minV: number; maxV: number; valueV: number; baseV: number; fill: string; hasMidscale: boolean };

/** An output gauge: graduated staff, level as a bar from its base, a triangle at the level, the reference as a dash-dot line. */
export function Gauge({ x, y, width, height, minV, maxV, valueV, baseV, fill, hasMidscale }: GaugeProps) {
  const at = (value: number) => y + height * (1 - (Math.min(maxV, Math.max(minV, value)) - minV) / (maxV - minV));
  const [level, base] = [at(valueV), at(baseV)];
  const scaleWidth = width * 0.36;
  return (
    <g>
      <rect x={x} y={y} width={width} height={height} fill="var(--sheet)" stroke="var(--ink)" strokeWidth="1" />
      {[0, 2, 4].map((index) => (
        <rect key={index} x={x} y={y + height - (height * (index + 1)) / 6} width={scaleWidth} height={height / 6} fill="var(--ink)" />
      ))}
      <rect x={x + scaleWidth} y={Math.min(level, base)} width={width - scaleWidth} height={Math.max(0.1, Math.abs(base - level))} fill={fill} />
      {hasMidscale && <path d={`M${x - 6} ${base}H${x + width + 7}`} stroke="var(--ref)" strokeWidth="1.4" strokeDasharray="5 2 1.5 2" />}
      <path d={`M${x + scaleWidth} ${level}H${x + width + 3}`} stroke="var(--ink)" strokeWidth="1.8" />
      <path d={`M${x + width + 1} ${level}l6 -4v8z`} fill="var(--ink)" />
    </g>
  );
}
