import { readFileSync, readdirSync } from "node:fs";
import { join, relative, resolve } from "node:path";
import { describe, expect, it } from "vitest";
import { findLayerFaults, findLongFiles, type SourceFile } from "../support/layers";

const root = resolve(import.meta.dirname, "../..");

function readSources(folder: string): SourceFile[] {
  return readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    const path = join(folder, entry.name);
    if (entry.name === "node_modules" || entry.name.startsWith(".")) return [];
    if (entry.isDirectory()) return readSources(path);
    if (!/\.tsx?$/.test(entry.name) || entry.name.endsWith(".d.ts")) return [];
    return [{ path: relative(root, path).replaceAll("\\", "/"), text: readFileSync(path, "utf8") }];
  });
}

const faultsOf = (path: string, text: string) => findLayerFaults([{ path, text }]);

describe("layers", () => {
  const sources = readSources(root);

  it("no file of the tree crosses a forbidden line", () => {
    expect(sources.some(({ path }) => path.startsWith("lib/engine/"))).toBe(true);
    expect(findLayerFaults(sources)).toEqual([]);
  });

  it("files over the size at which a kind of file should be split are named", () => {
    const long = findLongFiles(sources);
    if (long.length > 0) console.warn(`over their size:\n  ${long.join("\n  ")}`);
    expect(findLongFiles([{ path: "lib/engine/solver/simulate.ts", text: "\n".repeat(301) }])).toEqual([
      "lib/engine/solver/simulate.ts: 301 lines, stop is 300",
    ]);
  });
});

describe("the layer check refuses", () => {
  it.each([
    ["lib/engine/solver/a.ts", 'import { x } from "@/components/plot/ticks";', "lib/engine must not import components"],
    ["lib/engine/solver/a.ts", 'import { x } from "../../scenario/schema";', "lib/engine must import only types of lib"],
    ["lib/engine/solver/a.ts", 'import { z } from "zod";', "lib/engine must not import package zod"],
    ["lib/engine/model/a.ts", 'import { x } from "../solver/propagate";', "engine/model must not look up or across at engine/solver"],
    ["lib/engine/sizing/a.ts", 'import { x } from "@/lib/engine/faults/inject";', "engine/sizing must not look up or across at engine/faults"],
    ["lib/engine/model/a.ts", 'export * from "../index";', "engine/model must not look up at the public list"],
    ["lib/scenario/a.ts", 'import { db } from "@/db/client";', "lib must not import db"],
    ["lib/scenario/a.ts", 'const x = await import("@/lib/server/env");', "lib must not import lib/server"],
    ["components/ui/a.tsx", 'import {\n  x,\n} from "@/lib/scenario/schema";', "components/ui must not import lib"],
    ["components/plot/a.tsx", 'import { x } from "@/db/queries/scenarios";', "components must import only types of db/queries"],
    ["components/plot/a.tsx", 'import { x } from "@/app/(work)/actions";', "components must not import app"],
    ["workers/a.ts", 'import { useState } from "react";', "workers must not import package react"],
    ["app/page.tsx", 'import { users } from "@/db/schema/people";', "app must import only types of db/schema"],
    ["app/page.tsx", 'import { x } from "../tests/support/layers";', "app must not import tests"],
    ["components/plot/index.ts", "export const x = 1;", "no index file here: import the file that holds the thing"],
    ["lib/engine/solver/a.ts", "export const x = () => Math.random();", "lib/engine must stay pure: Math.random"],
    ["lib/engine/solver/a.ts", "export const x = () => Date.now();", "lib/engine must stay pure: Date.now"],
    ["lib/units/a.ts", "export const x = new Date();", "lib/units must stay pure: new Date()"],
    ["lib/units/a.ts", "export const x = document.title;", "lib/units must stay pure: document"],
    ["lib/engine/solver/a.ts", "export const x = () => process.env.HOME;", "lib/engine must stay pure: process"],
  ])("%s with %s", (path, text, fault) => {
    expect(faultsOf(path, text)).toEqual([expect.stringMatching(new RegExp(`^${path.replace(/[.()]/g, "\\$&")}:\\d+ `))]);
    expect(faultsOf(path, text)[0]).toContain(fault);
  });
});

describe("the layer check lets pass", () => {
  it.each([
    ["lib/engine/solver/a.ts", 'import type { ScenarioDocument } from "@/lib/scenario/schema";'],
    ["lib/engine/solver/a.ts", 'import { type ScenarioDocument } from "@/lib/scenario/schema";'],
    ["lib/engine/sensing/a.ts", 'import { x } from "../model/legs";'],
    ["lib/engine/solver/a.ts", 'import type { Simulation } from "../results";'],
    ["lib/engine/index.ts", 'export { simulate } from "./solver/simulate";'],
    ["lib/engine/solver/a.ts", "export const x = (document: { run: number }) => document.run; // Math.random()"],
    ["components/plot/a.tsx", 'import type { ScenarioRow } from "@/db/queries/scenarios";\nexport const x = () => window.innerWidth;'],
    ["scripts/calc.ts", 'import { simulate } from "@/lib/engine";\nimport { readFileSync } from "node:fs";'],
  ])("%s with %s", (path, text) => {
    expect(faultsOf(path, text)).toEqual([]);
  });
});
