import { BYPASS_OUT, BYPASS_REACH, CHANNEL, type BridgeGeometry } from "./geometry";

type SwitchPlace = { name: "AH" | "AL" | "BH" | "BL"; x: number; y: number; out: 1 | -1 };

export const switchPlaces = (g: BridgeGeometry): SwitchPlace[] => [
  { name: "AH", x: g.xA, y: g.yHigh, out: -1 },
  { name: "AL", x: g.xA, y: g.yLow, out: -1 },
  { name: "BH", x: g.xB, y: g.yHigh, out: 1 },
  { name: "BL", x: g.xB, y: g.yLow, out: 1 },
];

const bypassPath = ({ x, y, out }: SwitchPlace): string => {
  const far = x + out * BYPASS_OUT;
  const near = x + out * (BYPASS_OUT - 4);
  const [top, bottom] = [y - BYPASS_REACH, y + BYPASS_REACH];
  return `M${x} ${top}H${near}Q${far} ${top} ${far} ${top + 4}V${bottom - 4}Q${far} ${bottom} ${near} ${bottom}H${x}`;
};

/** Banks and beds of all channels. Drawn twice, wide in the banks' colour and then narrower in the beds', so that junctions open by themselves. */
export function Channels({ geometry: g }: { geometry: BridgeGeometry }) {
  const main = `M${g.xSupply} ${g.yTop}H${g.xB}M${g.xSupply} ${g.yBottom}H${g.xB}M${g.xSupply} ${g.yTop}V${g.yBottom}M${g.xA} ${g.yTop}V${g.yBottom}M${g.xB} ${g.yTop}V${g.yBottom}M${g.xA} ${g.yMid}H${g.xB}`;
  const side = switchPlaces(g).map(bypassPath).join("");
  return (
    <g fill="none">
      <path d={side} stroke="var(--edge)" strokeWidth="14" />
      <path d={main} stroke="var(--edge)" strokeWidth={CHANNEL + 2} strokeLinecap="square" />
      <path d={side} stroke="var(--sheet)" strokeWidth="12" />
      <path d={main} stroke="var(--sheet)" strokeWidth={CHANNEL} strokeLinecap="square" />
    </g>
  );
}
