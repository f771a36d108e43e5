import { z, type ZodError } from "zod";
import type { Finding } from "@/lib/result";
import { parseScenario } from "@/lib/scenario/schema";

/** A scenario document as a field of a form: checked by the scenario schema, whose findings (path inside the document, range) come out unchanged. */
export const scenarioField = z.unknown().transform((value, context) => {
  const parsed = parseScenario(value);
  if (parsed.ok) return parsed.document;
  for (const finding of parsed.findings)
    context.addIssue({ code: "custom", message: finding.text, params: { finding } });
  return z.NEVER;
});

export const keyField = z.uuid({ error: "This names nothing." });
export const titleField = z
  .string()
  .trim()
  .min(1, { error: "A title has 1 to 120 characters." })
  .max(120, { error: "A title has 1 to 120 characters." });
export const messageField = z.string().trim().max(500, { error: "A message has at most 500 characters." }).default("");

/** What zod found wrong with a form, as findings: path, code, text. */
export function findingsOf(error: ZodError): Finding[] {
  return error.issues.map((issue) => {
    const own: unknown = issue.code === "custom" ? issue.params?.finding : undefined;
    return isFinding(own)
      ? own
      : { path: issue.path.map(String).join("."), code: "input.invalid", text: issue.message };
  });
}

const isFinding = (value: unknown): value is Finding =>
  typeof value === "object" && value !== null && "path" in value && "text" in value;
