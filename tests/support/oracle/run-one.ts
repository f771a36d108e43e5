import { readFileSync } from "node:fs";
import { simulate } from "@/lib/engine";
import { parseScenario } from "@/lib/scenario/schema";

/** Runs one document in a process of its own, so that a run without end can be stopped: prints status, energy and what is not finite. */
const parsed = parseScenario(JSON.parse(readFileSync(process.argv[2] ?? "", "utf8")));
if (!parsed.ok) throw new Error(JSON.stringify(parsed.findings));
const startMs = performance.now();
const { durationS } = parsed.document.run;
const result = simulate(parsed.document, { at: [0, durationS / 3, durationS] });
const text = JSON.stringify(result, (_key, value: unknown) => (typeof value === "number" && !Number.isFinite(value) ? "NOT FINITE" : value));
console.log(JSON.stringify({ status: result.status, isFinite: !text.includes("NOT FINITE"), energyResidualShare: result.figures.energyResidualShare, milliseconds: performance.now() - startMs }));
