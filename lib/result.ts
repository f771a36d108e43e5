/** One thing wrong with what a person or a program gave us: where (a path such as `supply.voltageV`), what, and the range. */
export type Finding = { path: string; code: string; text: string };

import type { ErrorCode } from "./errors";

export type Result<T> = { ok: true; value: T } | { ok: false; code: ErrorCode; findings?: Finding[]; detail?: unknown };

export const success = <T>(value: T): Result<T> => ({ ok: true, value });
export const failure = (code: ErrorCode, more: { findings?: Finding[]; detail?: unknown } = {}): Result<never> => ({ ok: false, code, ...more });
