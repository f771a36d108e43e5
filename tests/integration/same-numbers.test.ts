import { execFileSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { sql } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import type { Simulation } from "@/lib/engine/results";
import { templateById } from "@/lib/scenario/templates";
import { answerSimulation } from "@/lib/server/simulation-route";
import { EngineTasks } from "@/workers/engine-tasks";
import { createTestDatabase, type TestDatabase } from "./support/database";
import { makeWorld, type World } from "./support/world";

/** The worker's task, the command line as a process, and the API give the same numbers to the bit. */

const root = join(import.meta.dirname, "../..");
const folder = mkdtempSync(join(tmpdir(), "same-numbers-"));
let database: TestDatabase;
let world: World;
beforeAll(async () => {
  database = await createTestDatabase();
  world = await makeWorld(database.owner.db);
  await database.owner.db.execute(sql`delete from rate_limits`);
});
afterAll(async () => {
  rmSync(folder, { recursive: true });
  await database.drop();
});

/** What goes over a wire: numbers written and read back, undefined left out. */
const asJson = (value: unknown): unknown => JSON.parse(JSON.stringify(value));
const numbersOf = ({ at, figures, samples, events, notices }: Simulation) => ({ at, figures, samples, events, notices });

describe.each(["reversal", "high-side-recirculation", "battery-coil"])("%s", (id) => {
  test("worker, command line and API agree in instants, figures, samples, events and notices", async () => {
    const { document } = templateById(id)!;
    const at = [0, document.run.durationS * 0.37, document.run.durationS];
    const outcome = await new EngineTasks(() => Promise.resolve(), () => 0).run({ document, at });
    if (!outcome.ok) throw new Error(outcome.failure.code);
    const fromWorker = asJson(numbersOf(outcome.value.simulation));

    const file = join(folder, `${id}.json`);
    writeFileSync(file, JSON.stringify(document));
    const printed = execFileSync("npm", ["run", "-s", "calc", "--", "simulate", file, "--at", at.join(",")], { cwd: root, encoding: "utf8", maxBuffer: 1e8 });
    expect(numbersOf(JSON.parse(printed) as Simulation)).toEqual(fromWorker);

    const request = new Request("http://localhost/api/v1/simulations", { method: "POST", headers: { "content-type": "application/json" }, body: JSON.stringify({ document, at }) });
    const response = await answerSimulation(database.app.db, world.scopes.designer, request);
    expect(response.status).toBe(200);
    expect(numbersOf((await response.json()) as Simulation)).toEqual(fromWorker);
  });
});
