import { errorText } from "@/lib/errors";
import { parseScenario, type ScenarioDocument } from "@/lib/scenario/schema";

/** A stored document, checked by the same schema that let it in. One that no longer passes is a fault of ours, said with its revision and paths. */
export function readStoredDocument(value: unknown, where: string): ScenarioDocument {
  const parsed = parseScenario(value);
  if (!parsed.ok)
    throw new Error(
      `${errorText("server.failed")} ${where} does not pass the scenario schema: ${parsed.findings.map((finding) => finding.path).join(", ")}`,
    );
  return parsed.document;
}

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;
/** An id from a URL may be anything: what is no uuid names nothing, and must not reach PostgreSQL as one. */
export const isKey = (value: string): boolean => UUID.test(value);
