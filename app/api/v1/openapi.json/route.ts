import { openApiDocument } from "@/lib/server/openapi";

/** What the API is, as OpenAPI 3.1. */
export function GET(): Response {
  return Response.json(openApiDocument(), { headers: { "cache-control": "public, max-age=3600" } });
}
