import type { Finding } from "@/lib/result";
import { parseScenario, SCENARIO_FORMAT, type ParsedScenario } from "./schema";

/**
 * Reads a document of any format version that was ever published, as one of the newest. There is one so far; a second one
 * adds a step here, and stored revisions stay as they were written.
 */
export function upgradeScenario(value: unknown): ParsedScenario {
  const unknownFormat = formatFinding(value);
  return unknownFormat ? { ok: false, findings: [unknownFormat] } : parseScenario(value);
}

const FORMAT = /^slackwater\.scenario\/(\d{1,6})$/;

/** What is wrong with the format line, if it names a version that this product does not know; nothing otherwise. */
function formatFinding(value: unknown): Finding | undefined {
  if (typeof value !== "object" || value === null || !Object.hasOwn(value, "format")) return undefined;
  const { format } = value as { format: unknown };
  if (typeof format !== "string" || format === SCENARIO_FORMAT) return undefined;
  const version = FORMAT.exec(format)?.[1];
  const text =
    version !== undefined && Number(version) > 1
      ? `This document has format version ${Number(version)}; this Slackwater reads version 1. Open it with a newer one.`
      : `${JSON.stringify(format.slice(0, 60))} is no format of a scenario; ${SCENARIO_FORMAT} is expected.`;
  return { path: "format", code: "format.unknown", text };
}
