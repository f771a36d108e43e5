import type { Finding } from "./result";

/**
 * The one list of what can go wrong. A code is `area.what`; its words for a person and its HTTP status stand here and
 * nowhere else, so a page, an action and the API say the same thing.
 */
export const ERRORS = {
  "input.invalid": { status: 422, text: "Some values are outside what is allowed. Each one is listed with its range." },
  "input.not-json": { status: 400, text: "The body is not valid JSON." },
  "input.media-type": { status: 415, text: "Send the body as application/json." },
  "input.too-large": { status: 413, text: "The body is larger than this address accepts." },
  "auth.required": { status: 401, text: "Sign in to go on." },
  "auth.refused": { status: 401, text: "E-mail and password do not belong together." },
  "access.denied": { status: 403, text: "Your role in this workspace does not include this." },
  "thing.missing": { status: 404, text: "There is nothing here, or nothing that you may see." },
  "edit.conflict": {
    status: 409,
    text: "Someone saved a newer revision. Both versions are kept: compare them, or keep yours as a new revision.",
  },
  "edit.archived": { status: 409, text: "This scenario is archived. Restore it before changing it." },
  "limit.reached": { status: 429, text: "Too many attempts. Wait a little, then try again." },
  "link.unknown": { status: 404, text: "This link leads nowhere. Check that it was copied whole." },
  "link.expired": { status: 410, text: "This link has expired. Ask the person who sent it for a new one." },
  "link.revoked": { status: 410, text: "This link was withdrawn by the people who made it." },
  "engine.cancelled": { status: 503, text: "The run was cancelled before it ended." },
  "engine.superseded": { status: 409, text: "A newer run took the place of this one." },
  "engine.no-run": { status: 409, text: "There is no run to read from yet." },
  "engine.too-long": {
    status: 422,
    text: "The run has more PWM periods than this address computes. Shorten it, or run it in the page.",
  },
  "engine.timed-out": {
    status: 503,
    text: "The run took longer than this address allows. Shorten it, or run it in the page.",
  },
  "engine.not-finite": { status: 422, text: "The run left the range of finite numbers. Check the values it names." },
  "engine.failed": { status: 500, text: "The engine stopped with a fault of its own." },
  "server.unreachable": { status: 503, text: "The server cannot be reached. Your work is kept here." },
  "server.failed": { status: 500, text: "Something broke on our side. Nothing was changed." },
} as const satisfies Record<string, { status: number; text: string }>;

export type ErrorCode = keyof typeof ERRORS;

export const errorText = (code: ErrorCode): string => ERRORS[code].text;
export const errorStatus = (code: ErrorCode): number => ERRORS[code].status;

/** Thrown where a value cannot be returned (inside a transaction, so that it rolls back); the action wrapper turns it into a Result. */
export class Refusal extends Error {
  readonly code: ErrorCode;
  readonly findings?: Finding[];
  readonly detail?: unknown;

  constructor(code: ErrorCode, more: { findings?: Finding[]; detail?: unknown; cause?: unknown } = {}) {
    super(`${code}: ${ERRORS[code].text}`, { cause: more.cause });
    this.name = "Refusal";
    this.code = code;
    this.findings = more.findings;
    this.detail = more.detail;
  }
}
