/**
 * Who may do what, as one table. Actions and routes ask `can`; the row-level-security policies in drizzle/ hold the same
 * rules a second time, and tests/integration/roles.test.ts walks every cell through both.
 */
export const MEMBER_ROLES = ["admin", "lead", "designer", "trainer", "student"] as const;
export const ROLES = [...MEMBER_ROLES, "guest"] as const;
export type MemberRole = (typeof MEMBER_ROLES)[number];
/** `guest` is whoever holds a share link and has no account: no membership row, ever. */
export type Role = (typeof ROLES)[number];

/**
 * How far a right reaches inside the person's own workspace:
 * `all` things, `approved` = own things and those with an approved revision, `own` things only, `none`.
 */
export type Reach = "all" | "approved" | "own" | "none";

type Row = Record<Role, Reach>;
const row = (admin: Reach, lead: Reach, designer: Reach, trainer: Reach, student: Reach, guest: Reach): Row => ({
  admin,
  lead,
  designer,
  trainer,
  student,
  guest,
});

// prettier-ignore
export const ACCESS = {
  //                          admin    lead    designer trainer student     guest
  "workspace.read":       row("all",  "all",  "all",  "all",  "all",      "none"),
  "members.read":         row("all",  "all",  "all",  "all",  "own",      "none"),
  "audit.read":           row("all",  "none", "none", "none", "none",     "none"),
  "scenario.read":        row("all",  "all",  "all",  "all",  "approved", "none"),
  "scenario.create":      row("all",  "all",  "all",  "all",  "none",     "none"),
  "scenario.duplicate":   row("all",  "all",  "all",  "all",  "approved", "none"),
  "scenario.rename":      row("all",  "all",  "all",  "own",  "own",      "none"),
  "scenario.tag":         row("all",  "all",  "all",  "own",  "own",      "none"),
  "scenario.archive":     row("all",  "all",  "own",  "own",  "own",      "none"),
  "scenario.restore":     row("all",  "all",  "own",  "own",  "own",      "none"),
  "revision.read":        row("all",  "all",  "all",  "all",  "approved", "none"),
  "revision.save":        row("all",  "all",  "all",  "own",  "own",      "none"),
  "draft.read":           row("own",  "own",  "own",  "own",  "own",      "none"),
  "share.list":           row("all",  "all",  "all",  "all",  "none",     "none"),
  "share.make":           row("all",  "all",  "all",  "all",  "none",     "none"),
  "share.change":         row("all",  "all",  "all",  "own",  "none",     "none"),
  "share.revoke":         row("all",  "all",  "all",  "own",  "none",     "none"),
  "simulation.run":       row("all",  "all",  "all",  "all",  "all",      "none"),
  "link.open":            row("all",  "all",  "all",  "all",  "all",      "all"),
} as const satisfies Record<string, Row>;

export type Deed = keyof typeof ACCESS;
export const DEEDS = Object.keys(ACCESS) as Deed[];

/** `isOwn`: the actor owns the scenario or made the link. `hasApproved`: some revision of it is approved and it is not archived. */
export type Thing = { isOwn: boolean; hasApproved?: boolean };

export function can(role: Role, deed: Deed, thing: Thing = { isOwn: false }): boolean {
  const reach: Reach = ACCESS[deed][role];
  if (reach === "all") return true;
  if (reach === "none") return false;
  return thing.isOwn || (reach === "approved" && thing.hasApproved === true);
}

/** What each role is called on screen, with the one sentence that explains it. */
export const ROLE_WORDS: Record<Role, { name: string; does: string }> = {
  admin: { name: "Admin", does: "Everything in the workspace, its members and the audit." },
  lead: { name: "Lead", does: "Reviews and approves; everything a designer does." },
  designer: { name: "Designer", does: "Makes, edits, simulates and shares scenarios." },
  trainer: { name: "Trainer", does: "Reads scenarios, edits own copies, shares links." },
  student: { name: "Student", does: "Reads approved scenarios and plays with own copies." },
  guest: { name: "Guest", does: "Sees and plays with exactly what a link names." },
};
