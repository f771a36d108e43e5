import type { DemoEmail, DEMO_WORKSPACES } from "@/lib/access/demo-accounts";
import type { ScenarioDocument } from "@/lib/scenario/schema";

type State = "draft" | "inReview" | "approved" | "superseded";

/** One earlier version of a document, told from its final one. */
type Step = { message: string; author: DemoEmail; edit: (final: ScenarioDocument) => ScenarioDocument };

export type Story = {
  workspace: keyof typeof DEMO_WORKSPACES;
  owner: DemoEmail;
  state: State;
  tags: string[];
  /** Earlier revisions, oldest first; the final document comes after them. */
  steps: Step[];
  finalMessage: string;
  /** Which revision is approved; the newest if the state is approved. */
  approvedNumber?: number;
  isArchived?: boolean;
};

const TESSA: DemoEmail = "designer@lowmeadow.example.org";
const JORUN: DemoEmail = "second-designer@lowmeadow.example.org";
const ILVAR: DemoEmail = "lead@lowmeadow.example.org";
const ODILE: DemoEmail = "trainer@lowmeadow.example.org";
const PIET: DemoEmail = "designer@northquay.example.org";

const withShunt = (factor: number) => (final: ScenarioDocument): ScenarioDocument => ({
  ...final,
  sensing: { ...final.sensing, shunt: { ...final.sensing.shunt, resistanceOhm: Number((final.sensing.shunt.resistanceOhm * factor).toPrecision(3)) } },
});
const withPhase = (phase: number) => (final: ScenarioDocument): ScenarioDocument => ({
  ...final,
  sensing: { ...final.sensing, converter: { ...final.sensing.converter, phase } },
});
const withDeadTime = (deadTimeS: number) => (final: ScenarioDocument): ScenarioDocument => ({ ...final, bridge: { ...final.bridge, deadTimeS } });

const halfShunt = (author: DemoEmail): Step => ({ author, message: "First idea, with half the shunt", edit: withShunt(0.5) });
const doubleShunt = (author: DemoEmail): Step => ({ author, message: "Twice the shunt, to see the headroom go", edit: withShunt(2) });
const latePhase = (author: DemoEmail): Step => ({ author, message: "Sample late in the period", edit: withPhase(0.92) });
const longDeadTime = (author: DemoEmail): Step => ({ author, message: "Dead time of the old gate driver", edit: withDeadTime(1e-6) });

/** The stories of the waterworks, one per template in turn: who made it, how it came about, where it stands. */
export const STORIES: Story[] = [
  { workspace: "home", owner: TESSA, state: "approved", tags: ["gate", "24 V"], steps: [halfShunt(TESSA), latePhase(JORUN)], finalMessage: "Sample while the low side conducts; as measured on the rig" },
  { workspace: "home", owner: JORUN, state: "inReview", tags: ["gate", "sampling"], steps: [latePhase(JORUN)], finalMessage: "Ready for review" },
  { workspace: "home", owner: TESSA, state: "draft", tags: ["comparison"], steps: [longDeadTime(TESSA), doubleShunt(TESSA)], finalMessage: "Back to the shunt in stock", approvedNumber: 1 },
  { workspace: "home", owner: ILVAR, state: "approved", tags: ["precision"], steps: [doubleShunt(ILVAR)], finalMessage: "Smaller shunt, same error" },
  { workspace: "home", owner: JORUN, state: "draft", tags: ["precision", "low ohm"], steps: [longDeadTime(JORUN)], finalMessage: "Faster gate driver" },
  { workspace: "home", owner: ODILE, state: "draft", tags: ["course"], steps: [], finalMessage: "For the spring course" },
  { workspace: "home", owner: TESSA, state: "superseded", tags: ["gate"], steps: [halfShunt(TESSA)], finalMessage: "Replaced by the midscale design" },
  { workspace: "home", owner: JORUN, state: "approved", tags: ["battery"], steps: [latePhase(JORUN), halfShunt(JORUN)], finalMessage: "Agreed with the works" },
];

/** Copies and leftovers beside the templates; `template` counts from 0. */
export const EXTRAS: { template: number; title: string; copyOf?: number; story: Story }[] = [
  { template: 0, title: "My copy: what happens at the reversal", copyOf: 0, story: { workspace: "home", owner: "student@lowmeadow.example.org", state: "draft", tags: ["course"], steps: [], finalMessage: "Copied to try things" } },
  { template: 0, title: "Reversal for the spring course", copyOf: 0, story: { workspace: "home", owner: ODILE, state: "draft", tags: ["course"], steps: [longDeadTime(ODILE)], finalMessage: "Dead time as in the lesson" } },
  { template: 1, title: "Gate drive, first sketch", story: { workspace: "home", owner: TESSA, state: "draft", tags: ["gate"], steps: [halfShunt(TESSA)], finalMessage: "Put aside: the motor was changed", isArchived: true } },
  { template: 0, title: "Slewing drive, both directions", story: { workspace: "away", owner: PIET, state: "approved", tags: ["slewing"], steps: [halfShunt(PIET)], finalMessage: "As built" } },
  { template: 2, title: "Hoist brake release", story: { workspace: "away", owner: "admin@northquay.example.org", state: "draft", tags: ["hoist"], steps: [], finalMessage: "Start" } },
];

/** Links of the first scenario: one of each kind, so that every page a link can lead to is there to see. */
export const LINKS = [
  { name: "newest", label: "For the gate builder", follows: "newest" },
  { name: "pinned", label: "As approved, for the works council", follows: "pinned" },
  { name: "expired", label: "Site meeting last spring", follows: "newest" },
  { name: "revoked", label: "Sent to the wrong address", follows: "newest" },
] as const;
