import { scenarioJsonSchema } from "@/lib/server/openapi";

/** The JSON Schema of a scenario document, made from the schema that checks it. Public: it holds nobody's data. */
export function GET(): Response {
  return Response.json(scenarioJsonSchema(), {
    headers: { "content-type": "application/schema+json", "cache-control": "public, max-age=3600" },
  });
}
