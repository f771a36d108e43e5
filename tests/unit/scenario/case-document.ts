import { readFileSync } from "node:fs";
import { join } from "node:path";

/** A public case as it was sent (tests/reference/cases), to be broken one field at a time. */
export type Json = Record<string, unknown>;

const folder = join(import.meta.dirname, "../../reference/cases");

export const caseDocument = (name = "01-low-forward-sync"): Json =>
  JSON.parse(readFileSync(join(folder, `${name}.json`), "utf8")) as Json;

/** Sets or, with undefined, removes the field at a path in place. */
export function put(root: Json, path: string, value: unknown): void {
  const keys = path.split(".");
  const last = keys.pop()!;
  const parent = keys.reduce<Json>((node, key) => node[key] as Json, root);
  if (value === undefined) delete parent[last];
  else parent[last] = value;
}

/** The case with some fields changed. */
export function changedCase(changes: Readonly<Record<string, unknown>>, name?: string): Json {
  const document = caseDocument(name);
  for (const [path, value] of Object.entries(changes)) put(document, path, value);
  return document;
}
