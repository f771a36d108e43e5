import { CHANNEL, chevronsAlong, ribbonWidth, roundClosedPath, type BridgeGeometry, type Chevron, type Ribbon } from "./geometry";
import styles from "./bridge.module.css";

type Props = { ribbon: Ribbon; fullScaleA: number; geometry: BridgeGeometry };

const CHEVRON_STEP = 30;

/** The current as a ribbon along its path: width by ampere; chevrons double for forward, single for reverse. Nothing moves along it. */
export function RibbonShape({ ribbon, fullScaleA, geometry }: Props) {
  const width = ribbonWidth(ribbon.currentA, fullScaleA);
  if (width === 0) return null;
  const isThrough = ribbon.kind !== "motor";
  const isForward = ribbon.currentA >= 0;
  const color = isThrough ? "var(--fault)" : isForward ? "var(--fwd)" : "var(--rev)";
  const drawn = isThrough ? Math.min(CHANNEL - 1, width + 3) : width;
  const size = Math.max(2.4, drawn * 0.34);
  const places = chevronsAlong(ribbon.points, CHEVRON_STEP, 13).filter((place) => !isHidden(place, geometry));
  return (
    <g>
      <path className={styles.ribbon} d={roundClosedPath(ribbon.points, 9)} fill="none" stroke={color} strokeWidth={drawn} strokeLinejoin="round" />
      {places.map((place) => (
        <path
          key={`${place.x} ${place.y}`}
          transform={`translate(${place.x.toFixed(1)} ${place.y.toFixed(1)}) rotate(${place.angleDeg.toFixed(1)})`}
          d={isForward && !isThrough ? `${chevron(size, 1.5)}${chevron(size, -2)}` : chevron(size, 0)}
          fill="none"
          stroke="var(--sheet)"
          strokeWidth="1.25"
        />
      ))}
    </g>
  );
}

const chevron = (size: number, shift: number): string => `M${-size * 0.75 + shift} ${-size}L${size * 0.75 + shift} 0L${-size * 0.75 + shift} ${size}`;

/** Chevrons under the motor's disc or the supply's box would only show as crumbs at their rims. */
function isHidden(place: Chevron, g: BridgeGeometry): boolean {
  const isAtMotor = Math.abs(place.y - g.yMid) < 2 && Math.abs(place.x - (g.xA + g.xB) / 2) < g.motorRadius + 10;
  const isAtSupply = Math.abs(place.x - g.xSupply) < 2 && Math.abs(place.y - g.yMid) < 38;
  return isAtMotor || isAtSupply;
}
