import { z } from "zod";
import { scenarioSchema } from "./schema";

export type JsonSchema = Record<string, unknown>;

let made: JsonSchema | undefined;

/**
 * JSON Schema (draft 2020-12) of what may be sent, made from the zod schema. It holds fields, types, choices and ranges; the
 * rules between fields are checked by `parseScenario` only.
 */
export function scenarioJsonSchema(): JsonSchema {
  made ??= {
    ...(z.toJSONSchema(scenarioSchema, { io: "input", target: "draft-2020-12" }) as JsonSchema),
    $id: "slackwater.scenario/1",
    title: "Slackwater scenario, format 1",
    description: "SI base units; each field's name ends in its unit. Rules between fields come on top of this schema.",
  };
  return made;
}
