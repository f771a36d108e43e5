import { createHash } from "node:crypto";

const digest = (name: string) => createHash("sha256").update(`slackwater demo ${name}`).digest();

/** The id of a demo row, always the same for its name, so that seeding twice changes nothing. */
export function demoKey(name: string): string {
  const hex = digest(name).toString("hex");
  // the form of a version 8 UUID (RFC 9562, section 5.8): ours to fill
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-8${hex.slice(13, 16)}-a${hex.slice(17, 20)}-${hex.slice(20, 32)}`;
}

/** The token of a demo link (`newest`, `pinned`, `expired` or `revoked`); public like the demo's password. */
export const demoShareToken = (name: string): string => digest(`link ${name}`).toString("base64url");
