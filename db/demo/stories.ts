import type { DemoEmail, DEMO_WORKSPACES } from "@/lib/access/demo-accounts";
import type { ScenarioDocument } from "@/lib/scenario/schema";

type State = "draft" | "inReview" | "approved" | "superseded";

/** One earlier version of a document, told from its final one. */
type Step = { message: string; author: DemoEmail; edit: (final: ScenarioDocument) => ScenarioDocument };

export type Story = {
  workspace: keyof typeof DEMO_WORKSPACES;
  owner: DemoEmail;
  state: State;
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
const NICO: DemoEmail = "student@lowmeadow.example.org";
const PIET: DemoEmail = "designer@northquay.example.org";
const SUNA: DemoEmail = "admin@northquay.example.org";

const withShunt =
  (factor: number) =>
  (final: ScenarioDocument): ScenarioDocument => ({
    ...final,
    sensing: {
      ...final.sensing,
      shunt: {
        ...final.sensing.shunt,
        resistanceOhm: Number((final.sensing.shunt.resistanceOhm * factor).toPrecision(3)),
      },
    },
  });
const withPhase =
  (phase: number) =>
  (final: ScenarioDocument): ScenarioDocument => ({
    ...final,
    sensing: { ...final.sensing, converter: { ...final.sensing.converter, phase } },
  });
const withDeadTime =
  (deadTimeS: number) =>
  (final: ScenarioDocument): ScenarioDocument => ({ ...final, bridge: { ...final.bridge, deadTimeS } });

const halfShunt = (author: DemoEmail): Step => ({
  author,
  message: "First idea, with half the shunt",
  edit: withShunt(0.5),
});
const doubleShunt = (author: DemoEmail): Step => ({
  author,
  message: "Twice the shunt, to see the headroom go",
  edit: withShunt(2),
});
const latePhase = (author: DemoEmail): Step => ({
  author,
  message: "Sample late in the period",
  edit: withPhase(0.92),
});
const longDeadTime = (author: DemoEmail): Step => ({
  author,
  message: "Dead time of the old gate driver",
  edit: withDeadTime(1e-6),
});

const byTessa = (state: State, finalMessage: string, steps: Step[], more: Partial<Story> = {}): Story => ({
  workspace: "home",
  owner: TESSA,
  state,
  finalMessage,
  steps,
  ...more,
});
const byJorun = (state: State, finalMessage: string, steps: Step[]): Story => ({
  ...byTessa(state, finalMessage, steps),
  owner: JORUN,
});

/** The stories of the waterworks' scenarios, by template: who made it, how it came about, where it stands. */
export const STORIES: Record<string, Story> = {
  reversal: byTessa("approved", "Sample in the on-time; as measured on the rig", [halfShunt(TESSA), latePhase(JORUN)]),
  "continuous-on": byTessa("draft", "Back to the shunt in stock", [halfShunt(TESSA), longDeadTime(TESSA)], {
    approvedNumber: 1,
  }),
  "low-side-recirculation": byJorun("inReview", "Ready for review", [latePhase(JORUN)]),
  "high-side-recirculation": byJorun("approved", "Same drive, other recirculation; agreed with the works", [
    longDeadTime(JORUN),
  ]),
  "large-shunt": { ...byTessa("draft", "For the spring course", []), owner: ODILE },
  "sub-milliohm": { ...byTessa("approved", "Half the shunt, the error holds", [doubleShunt(ILVAR)]), owner: ILVAR },
  "combined-midscale": byJorun("draft", "Faster gate driver", [longDeadTime(JORUN)]),
  "two-output-difference": byTessa("superseded", "Replaced by the midscale design", [latePhase(TESSA)]),
  "battery-coil": byJorun("approved", "Hold at half", [doubleShunt(JORUN)]),
};
/** For a template that has no story yet. */
export const PLAIN_STORY: Story = byTessa("draft", "From the bench", []);

type Extra = { templateId: string; title: string; isCopy?: boolean; story: Story };
const only = (owner: DemoEmail, finalMessage: string, more: Partial<Story> = {}): Story => ({
  ...PLAIN_STORY,
  owner,
  finalMessage,
  ...more,
});

/** Copies and leftovers beside the templates, and what the other workspace has. */
export const EXTRAS: Extra[] = [
  {
    templateId: "reversal",
    title: "My copy: what happens at the reversal",
    isCopy: true,
    story: only(NICO, "Copied to try things"),
  },
  {
    templateId: "reversal",
    title: "Reversal for the spring course",
    isCopy: true,
    story: only(ODILE, "Dead time as in the lesson", { steps: [longDeadTime(ODILE)] }),
  },
  {
    templateId: "continuous-on",
    title: "Gate drive, first sketch",
    story: only(TESSA, "Put aside: the motor was changed", { steps: [halfShunt(TESSA)], isArchived: true }),
  },
  {
    templateId: "reversal",
    title: "Slewing drive, both directions",
    story: only(PIET, "As built", { workspace: "away", state: "approved", steps: [halfShunt(PIET)] }),
  },
  {
    templateId: "combined-midscale",
    title: "Hoist, lowering and lifting",
    story: only(SUNA, "Start", { workspace: "away" }),
  },
];

/** Links of the first scenario: one of each kind, so that every page a link can lead to is there to see. */
export const LINKS = [
  { name: "newest", label: "For the gate builder", follows: "newest" },
  { name: "pinned", label: "As approved, for the works council", follows: "pinned" },
  { name: "expired", label: "Site meeting last spring", follows: "newest" },
  { name: "revoked", label: "Sent to the wrong address", follows: "newest" },
] as const;
