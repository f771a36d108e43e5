import type { Deed, Reach } from "@/lib/access/table";

/** Every deed of the access table in words, in the form "may …". */
export const DEED_WORDS: Record<Deed, string> = {
  "workspace.read": "Open the workspace",
  "members.read": "See the members",
  "audit.read": "Read the audit",
  "scenario.read": "Open scenarios",
  "scenario.create": "Make scenarios",
  "scenario.duplicate": "Duplicate scenarios",
  "scenario.rename": "Change titles",
  "scenario.tag": "Change tags",
  "scenario.archive": "Archive scenarios",
  "scenario.restore": "Restore scenarios",
  "revision.read": "Read revisions",
  "revision.save": "Save revisions",
  "draft.read": "Read kept drafts",
  "share.list": "See share links",
  "share.make": "Make share links",
  "share.change": "Change when links end",
  "share.revoke": "Revoke share links",
  "simulation.run": "Run simulations",
  "link.open": "Open share links",
};

export const REACH_WORDS: Record<Reach, string> = { all: "all", approved: "own and approved", own: "own", none: "–" };

type Detail = Record<string, unknown>;
const text = (value: unknown): string => (typeof value === "string" && value !== "" ? value : "");
const revision = (detail: Detail) => (typeof detail.number === "number" ? ` ${detail.number}` : "");

/** What was done, for a row of the audit. */
const DONE: Partial<Record<string, (detail: Detail) => string>> = {
  "scenario.create": () => "Made a scenario",
  "scenario.duplicate": () => "Made a copy",
  "scenario.rename": () => "Changed the title",
  "scenario.tag": ({ tags }) => (Array.isArray(tags) && tags.length > 0 ? `Set the tags ${tags.join(", ")}` : "Took the tags away"),
  "scenario.archive": () => "Archived",
  "scenario.restore": () => "Restored",
  "revision.save": (detail) => `${detail.draftId ? "Saved a kept draft as revision" : "Saved revision"}${revision(detail)}`,
  "share.make": ({ follows, revisionNumber }) => `Made a link to ${follows === "newest" ? "the newest revision" : `revision ${String(revisionNumber)}`}`,
  "share.revoke": () => "Revoked a link",
  "share.change": ({ expiresAt }) => (text(expiresAt) ? `Set a link to end on ${text(expiresAt).slice(0, 10)}` : "Let a link run on"),
  "session.start": () => "Signed in",
  "session.revoke": () => "Ended a session",
};

/** One sentence for an audit row; a refused deed says so. */
export function doneWords(deed: string, detail: Detail): string {
  const words = DONE[deed]?.(detail) ?? deed;
  return text(detail.refused) ? `${words}: refused` : words;
}

/** The scenario a row is about, where it names one, and what it was called in the row. */
export function thingOf({ deed, thingId, detail }: { deed: string; thingId: string | null; detail: Detail }): { scenarioId: string | null; name: string } {
  const isScenario = deed.startsWith("scenario.") || deed.startsWith("revision.");
  return { scenarioId: isScenario ? thingId : text(detail.scenarioId) || null, name: text(detail.label) || text(detail.title) };
}
