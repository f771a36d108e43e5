import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { sql } from "drizzle-orm";
import { GET as getDescription } from "@/app/api/v1/openapi.json/route";
import { GET as getSchema } from "@/app/api/v1/schema/scenario/route";
import { simulate } from "@/lib/engine/index";
import { answerSimulation } from "@/lib/server/simulation-route";
import { simulationSchema } from "@/lib/server/openapi-results";
import { findSchemaFaults } from "./support/json-schema";
import { createTestDatabase, type TestDatabase } from "./support/database";
import { makeWorld, shortDocument, type World } from "./support/world";

let database: TestDatabase;
let world: World;
beforeAll(async () => {
  database = await createTestDatabase();
  world = await makeWorld(database.owner.db);
});
beforeEach(async () => {
  await database.owner.db.execute(sql`delete from rate_limits`);
});
afterAll(() => database.drop());

const send = (
  body: unknown,
  headers: Record<string, string> = { "content-type": "application/json" },
  signal?: AbortSignal,
) =>
  answerSimulation(
    database.app.db,
    world.scopes.student,
    new Request("http://localhost/api/v1/simulations", {
      method: "POST",
      headers,
      body: typeof body === "string" ? body : JSON.stringify(body),
      signal,
    }),
  );
const readProblem = async (response: Response) => {
  expect(response.headers.get("content-type")).toBe("application/problem+json");
  const body = (await response.json()) as {
    type: string;
    title: string;
    status: number;
    code: string;
    errors?: { path: string }[];
  };
  expect(body.status).toBe(response.status);
  expect(body.type).toBe(`urn:slackwater:problem:${body.code}`);
  expect(body.title.length).toBeGreaterThan(10);
  return body;
};

describe("POST /api/v1/simulations", () => {
  it("gives the engine's numbers, bit for bit, wrapped or bare", async () => {
    const document = shortDocument();
    const at = [0, 2.5e-5, 9.99e-4, 1e-3];
    const wrapped = await send({ document, at });
    expect(wrapped.status).toBe(200);
    expect(await wrapped.json()).toEqual(JSON.parse(JSON.stringify(simulate(document, { at }))));
    const bare = await send(document);
    expect(await bare.json()).toEqual(JSON.parse(JSON.stringify(simulate(document))));
  });

  it("answers as its description says, down to the fields", async () => {
    const response = await send({ document: shortDocument(), at: [5e-4] });
    expect(findSchemaFaults(simulationSchema, await response.json())).toEqual([]);
  });

  it("asks who it is first", async () => {
    const request = new Request("http://localhost/", { method: "POST", body: "{" });
    expect(await readProblem(await answerSimulation(database.app.db, null, request))).toMatchObject({
      status: 401,
      code: "auth.required",
    });
  });

  it("refuses a broken document with every path at once", async () => {
    const document = shortDocument();
    const broken = { ...document, supply: { voltageV: "24" }, pwm: { ...document.pwm, frequencyHz: 1e9 }, extra: 1 };
    const body = await readProblem(await send({ document: broken, at: [0], more: true }));
    expect(body).toMatchObject({ status: 422, code: "input.invalid" });
    expect(body.errors?.map((one) => one.path)).toEqual(
      expect.arrayContaining(["more", "supply.voltageV", "pwm.frequencyHz", "extra"]),
    );
  });

  it("refuses instants outside the run, each by its place", async () => {
    const body = await readProblem(await send({ document: shortDocument(), at: [0, -1e-9, 2e-3, "1", null] }));
    expect(body.errors?.map((one) => one.path)).toEqual(["at.1", "at.2", "at.3", "at.4"]);
    expect(await readProblem(await send({ document: shortDocument(), at: 0 }))).toMatchObject({
      errors: [{ path: "at" }],
    });
    expect(await readProblem(await send({ document: shortDocument(), at: new Array(10_001).fill(0) }))).toMatchObject({
      errors: [{ path: "at" }],
    });
  });

  it.each([
    ["no JSON", "{", 400, "input.not-json"],
    ["an empty body", "", 400, "input.not-json"],
    ["a list", "[]", 422, "input.invalid"],
    ["a body of more than 256 KiB", `"${"x".repeat(256 * 1024)}"`, 413, "input.too-large"],
    ["deep nesting", "[".repeat(60_000) + "]".repeat(60_000), 422, "input.invalid"],
  ])("refuses %s", async (_name, body, status, code) => {
    expect(await readProblem(await send(body))).toMatchObject({ status, code });
  });

  it("refuses another media type", async () => {
    expect(await readProblem(await send(shortDocument(), { "content-type": "text/plain" }))).toMatchObject({
      status: 415,
      code: "input.media-type",
    });
  });

  it("refuses more than 200 000 periods or 2 000 000 conversions before starting, and says how many there are", async () => {
    const document = shortDocument();
    const long = { ...document, run: { durationS: 11 } };
    const body = await readProblem(await send(long));
    expect(body).toMatchObject({
      status: 422,
      code: "engine.too-long",
      errors: [{ path: "run.durationS", text: expect.stringContaining("220000 PWM periods") }],
    });
    const dense = {
      ...document,
      run: { durationS: 2.5 },
      sensing: { ...document.sensing, converter: { ...document.sensing.converter, perPeriod: 64 } },
    };
    expect(await readProblem(await send(dense))).toMatchObject({ code: "engine.too-long" });
  });

  it("stops when the caller has gone", async () => {
    const gone = new AbortController();
    const answer = send({ ...shortDocument(), run: { durationS: 5 } }, undefined, gone.signal);
    gone.abort();
    expect(await readProblem(await answer)).toMatchObject({ code: "engine.cancelled" });
  });

  it("takes sixty a minute from one person and then says how long to wait", async () => {
    let response = await send("{");
    for (let n = 0; n < 130 && response.status !== 429; n += 1) response = await send("{");
    expect(Number(response.headers.get("retry-after"))).toBeGreaterThanOrEqual(1);
    expect(await readProblem(response)).toMatchObject({ status: 429, code: "limit.reached" });
  });
});

describe("the descriptions", () => {
  it("the JSON Schema takes a valid document and refuses an unknown field and a value out of range", async () => {
    const response = getSchema();
    expect(response.headers.get("content-type")).toBe("application/schema+json");
    const schema = (await response.json()) as Record<string, unknown>;
    expect(schema.$schema).toBe("https://json-schema.org/draft/2020-12/schema");
    const document = JSON.parse(JSON.stringify(shortDocument())) as ReturnType<typeof shortDocument>;
    expect(findSchemaFaults(schema, document)).toEqual([]);
    expect(findSchemaFaults(schema, { ...document, colour: "blue" })).not.toEqual([]);
    expect(findSchemaFaults(schema, { ...document, supply: { ...document.supply, voltageV: 1e5 } })).not.toEqual([]);
  });

  it("the OpenAPI document names what exists, and every reference in it leads somewhere", async () => {
    const description = (await getDescription().json()) as {
      openapi: string;
      paths: Record<string, unknown>;
      components: { schemas: Record<string, unknown> };
    };
    expect(description.openapi).toMatch(/^3\.1\./);
    expect(Object.keys(description.paths).sort()).toEqual([
      "/api/v1/openapi.json",
      "/api/v1/schema/scenario",
      "/api/v1/simulations",
    ]);
    const references = [...JSON.stringify(description).matchAll(/"\$ref":"([^"]+)"/g)].map((match) => match[1]!);
    expect(references.length).toBeGreaterThan(3);
    for (const reference of references) {
      const found = reference
        .replace(/^#\//, "")
        .split("/")
        .reduce<unknown>((value, name) => (value as Record<string, unknown> | undefined)?.[name], description);
      expect(found, reference).toBeDefined();
    }
  });
});
