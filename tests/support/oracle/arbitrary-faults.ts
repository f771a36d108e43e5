import fc from "fast-check";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { quantity, spread, uniform, type Wildness } from "./arbitrary-scenario";

type Fault = ScenarioDocument["faults"][number];

/** Up to two faults that fit the site and the load. */
export const arbitraryFaults = (durationS: number, sensing: ScenarioDocument["sensing"], loadKind: string, wild: Wildness): fc.Arbitrary<Fault[]> => {
  const atS = uniform(0, 1).map((share) => share * durationS);
  const legName = fc.constantFrom("A" as const, "B" as const);
  const sideName = fc.constantFrom("high" as const, "low" as const);
  const isLeg = sensing.site === "legTop" || sensing.site === "legBottom";
  /** A shunt's or channel's fault names its leg where there is one shunt in each. */
  const onLeg = <F extends object>(fault: fc.Arbitrary<F>): fc.Arbitrary<F & { leg?: "A" | "B" }> => (isLeg ? fc.tuple(fault, legName).map(([given, leg]) => ({ ...given, leg })) : fault);
  const kind = <K extends Fault["kind"]>(name: K) => fc.constant(name);
  const any: fc.Arbitrary<Fault>[] = [
    fc.record({ kind: kind("openWinding"), atS }),
    fc.record({ kind: kind("switchStuckOpen"), atS, leg: legName, side: sideName }),
    fc.record({ kind: kind("switchShorted"), atS, leg: legName, side: sideName }),
    onLeg(fc.record({ kind: kind("shuntOpen"), atS })),
    onLeg(fc.record({ kind: kind("shuntDrifted"), atS, factor: quantity("faults.*.factor", spread(0.5, 2), wild) })),
    onLeg(fc.record({ kind: kind("amplifierOffsetShift"), atS, deltaV: quantity("faults.*.deltaV", fc.constantFrom(0.001, -0.002), wild) })),
    onLeg(fc.record({ kind: kind("amplifierStuckOutput"), atS, voltageV: quantity("faults.*.stuckV", fc.constantFrom(0, 1.1), wild) })),
    fc.record({ kind: kind("supplySag"), atS, voltageV: quantity("faults.*.sagV", spread(3, 30), wild) }),
  ];
  const motor: fc.Arbitrary<Fault>[] = [
    fc.record({ kind: kind("stalledRotor"), atS }),
    fc.record({ kind: kind("lostLoad"), atS }),
    fc.record({ kind: kind("risingFriction"), atS, coulombNm: quantity("faults.*.coulombNm", spread(1e-3, 0.3), wild), overS: spread(0.01, 2).map((share) => Math.min(60, share * durationS)) }),
    fc.record({ kind: kind("wornBrushes"), atS, factor: quantity("faults.*.factor", spread(1, 3), wild) }),
    fc.record({ kind: kind("shortedTurns"), atS, resistanceFactor: quantity("faults.*.resistanceFactor", spread(0.3, 1), wild), inductanceFactor: quantity("faults.*.inductanceFactor", spread(0.3, 1), wild), torqueFactor: quantity("faults.*.torqueFactor", spread(0.3, 1), wild) }),
  ];
  const drift: fc.Arbitrary<Fault>[] = sensing.reference ? [fc.record({ kind: kind("referenceDrift"), atS, deltaV: quantity("faults.*.deltaV", fc.constantFrom(0.03, -0.05), wild) })] : [];
  const possible = fc.oneof(...any, ...drift, ...(loadKind === "motor" ? motor : []));
  return fc.oneof({ weight: 3, arbitrary: fc.constant<Fault[]>([]) }, { weight: 2, arbitrary: fc.array(possible, { minLength: 1, maxLength: 2 }) });
};
