import { z } from "zod";
import { errorStatus, errorText, type ErrorCode } from "@/lib/errors";
import { scenarioSchema } from "@/lib/scenario/schema";
import { applicationUrl } from "./env";
import { problemSchema, simulationSchema } from "./openapi-results";
import { SIMULATION_LIMITS } from "./simulate";

/** The JSON Schema (2020-12) of a scenario document as it may be sent: fields with a default may be left out. */
export function scenarioJsonSchema(): Record<string, unknown> {
  const { $schema, ...schema } = z.toJSONSchema(scenarioSchema, { io: "input", target: "draft-2020-12" });
  return { $schema, $id: `${applicationUrl()}/api/v1/schema/scenario`, title: "Slackwater scenario", ...schema };
}

const REFUSALS: ErrorCode[] = [
  "input.not-json",
  "auth.required",
  "access.denied",
  "input.too-large",
  "input.media-type",
  "input.invalid",
  "engine.too-long",
  "limit.reached",
  "engine.failed",
  "engine.timed-out",
];

/** One response per HTTP status; codes that share a status are told apart by `code`. */
function problemResponses(codes: ErrorCode[]): Record<string, unknown> {
  const byStatus = new Map<number, ErrorCode[]>();
  for (const code of codes) byStatus.set(errorStatus(code), [...(byStatus.get(errorStatus(code)) ?? []), code]);
  return Object.fromEntries(
    [...byStatus].map(([status, alike]) => [
      String(status),
      {
        description: alike.map((code) => `${code}: ${errorText(code)}`).join(" "),
        content: { "application/problem+json": { schema: { $ref: "#/components/schemas/Problem" } } },
      },
    ]),
  );
}

/** The API as it is, in OpenAPI 3.1. */
export function openApiDocument(): Record<string, unknown> {
  const { $schema: _dialect, $id: _id, ...scenario } = scenarioJsonSchema();
  const ref = (name: string) => ({ $ref: `#/components/schemas/${name}` });
  return {
    openapi: "3.1.0",
    info: {
      title: "Slackwater",
      version: "1",
      description:
        "Simulates a PWM H-bridge, its motor and the sensing of its current. All quantities in SI base units; field names end in their unit.",
    },
    servers: [{ url: applicationUrl() }],
    paths: {
      "/api/v1/simulations": {
        post: {
          operationId: "simulate",
          summary: "Simulate a scenario document",
          description: `Up to ${SIMULATION_LIMITS.periodCount} PWM periods, ${SIMULATION_LIMITS.conversionCount} conversions, ${SIMULATION_LIMITS.atCount} instants and ${SIMULATION_LIMITS.bodyBytes} bytes.`,
          security: [{ session: [] }],
          requestBody: {
            required: true,
            content: { "application/json": { schema: { oneOf: [ref("SimulationRequest"), ref("Scenario")] } } },
          },
          responses: {
            "200": { description: "The run's results", content: { "application/json": { schema: ref("Simulation") } } },
            ...problemResponses(REFUSALS),
          },
        },
      },
      "/api/v1/schema/scenario": {
        get: {
          operationId: "readScenarioSchema",
          summary: "The JSON Schema of a scenario document",
          security: [],
          responses: {
            "200": {
              description: "JSON Schema 2020-12",
              content: { "application/schema+json": { schema: { type: "object" } } },
            },
          },
        },
      },
      "/api/v1/openapi.json": {
        get: {
          operationId: "readDescription",
          summary: "This description",
          security: [],
          responses: {
            "200": { description: "OpenAPI 3.1", content: { "application/json": { schema: { type: "object" } } } },
          },
        },
      },
    },
    components: {
      securitySchemes: {
        session: {
          type: "apiKey",
          in: "cookie",
          name: `${applicationUrl().startsWith("https:") ? "__Secure-" : ""}authjs.session-token`,
          description: "The cookie of a signed-in browser.",
        },
      },
      schemas: {
        Scenario: scenario,
        SimulationRequest: {
          type: "object",
          properties: {
            document: ref("Scenario"),
            at: {
              type: "array",
              items: { type: "number", minimum: 0 },
              maxItems: SIMULATION_LIMITS.atCount,
              description: "Instants in s, 0 to run.durationS",
            },
          },
          required: ["document"],
          additionalProperties: false,
        },
        Simulation: simulationSchema,
        Problem: problemSchema,
      },
    },
  };
}
