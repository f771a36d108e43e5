import { spawnSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join, resolve } from "node:path";
import { afterAll, describe, expect, test } from "vitest";
import { simulate, type Simulation } from "@/lib/engine/index";
import { parseScenario } from "@/lib/scenario/schema";
import { EXIT_REFUSED, EXIT_USAGE, runCalc, USAGE } from "@/scripts/calc-commands";
import { caseDocument, changedCase } from "./scenario/case-document";

const root = resolve(import.meta.dirname, "../..");
const casePath = join(root, "tests/reference/cases/01-low-forward-sync.json");
const folder = mkdtempSync(join(tmpdir(), "calc-"));
afterAll(() => rmSync(folder, { recursive: true }));

function fileOf(text: string): string {
  const path = join(folder, `${Math.random().toString(36).slice(2)}.json`);
  writeFileSync(path, text);
  return path;
}

function calc(...args: string[]) {
  let [out, err] = ["", ""];
  const status = runCalc(args, { out: (text) => (out += text), err: (text) => (err += text) });
  return { status, out, err };
}

describe("calc simulate", () => {
  test("prints the same numbers as the engine called directly", () => {
    const parsed = parseScenario(caseDocument());
    if (!parsed.ok) throw new Error("the public case is valid");
    const { status, out, err } = calc("simulate", casePath, "--at", "0.001,0.002");
    expect([status, err]).toEqual([0, ""]);
    expect(JSON.parse(out)).toEqual(JSON.parse(JSON.stringify(simulate(parsed.document, { at: [0.001, 0.002] }))));
  });
  test("refuses a document with every path on standard error and status 2", () => {
    const { status, out, err } = calc(
      "simulate",
      fileOf(JSON.stringify(changedCase({ "supply.voltageV": 3000, surprise: 1 }))),
    );
    expect([status, out]).toEqual([EXIT_REFUSED, ""]);
    expect(err.split("\n")).toEqual([
      "supply.voltageV: Supply voltage is 3 kV; enter 0.1 V to 2 kV.",
      'surprise: Field "surprise" is not part of a scenario here; remove it.',
      "",
    ]);
  });
  test.each([
    ["text that is no JSON", "{", /^The file is not JSON: /],
    ["NaN, which JSON has not", '{"format": NaN}', /^The file is not JSON: /],
    ["another version", '{"format": "slackwater.scenario/9"}', /^format: .* reads version 1/],
  ])("refuses %s with status 2", (_, text, message) => {
    const { status, err } = calc("simulate", fileOf(text));
    expect(status).toBe(EXIT_REFUSED);
    expect(err).toMatch(message);
  });
  test("refuses instants outside the run with status 2", () => {
    expect(calc("simulate", casePath, "--at=0.001,0.0021")).toEqual({
      status: EXIT_REFUSED,
      out: "",
      err: "at: 0.0021 s is outside the run; enter 0 s to 0.002 s.\n",
    });
  });
});

describe("a command line that is not understood ends with status 1 and the usage", () => {
  test.each([
    ["nothing", []],
    ["an unknown command", ["guess", casePath]],
    ["a command of every object", ["toString", casePath]],
    ["no file", ["simulate"]],
    ["two files", ["simulate", casePath, casePath]],
    ["a file that is not there", ["simulate", join(folder, "none.json")]],
    ["an unknown option", ["simulate", casePath, "--when", "1"]],
    ["an option without value", ["simulate", casePath, "--at"]],
    ["times that are no numbers", ["simulate", casePath, "--at", "1,,2"]],
  ])("%s", (_, args) => {
    const { status, out, err } = calc(...args);
    expect([status, out]).toEqual([EXIT_USAGE, ""]);
    expect(err).toMatch(/^calc: .+\.\n/);
    expect(err.endsWith(USAGE)).toBe(true);
  });
  test("but asking for the usage is fine", () => {
    expect(calc("--help")).toEqual({ status: 0, out: USAGE, err: "" });
  });
});

test("as a process it writes all of the result to a pipe and gives its status", () => {
  const run = (...args: string[]) =>
    spawnSync(process.execPath, ["--import", "tsx", "scripts/calc.ts", ...args], {
      cwd: root,
      encoding: "utf8",
      input: JSON.stringify(caseDocument()),
    });
  const good = run("simulate", "-");
  expect([good.status, good.stderr]).toEqual([0, ""]);
  expect((JSON.parse(good.stdout) as Simulation).status).toBe("reached-end");
  expect(run("simulate").status).toBe(EXIT_USAGE);
});
