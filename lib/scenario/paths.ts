/** Reads and writes single fields of a document by path (`load.motor.resistanceOhm`, `command.points.2.duty`). */

type Tree = Record<string, unknown>;
const isTree = (value: unknown): value is Tree => typeof value === "object" && value !== null;

/** The value at a path; undefined if any part of the way is missing. Own fields only. */
export function getAt(root: unknown, path: string): unknown {
  let value: unknown = root;
  if (path === "") return value;
  for (const key of path.split(".")) {
    if (!isTree(value) || !Object.hasOwn(value, key)) return undefined;
    value = value[key];
  }
  return value;
}

function withKey(node: unknown, keys: readonly string[], value: unknown): unknown {
  const [key, ...rest] = keys;
  const copy = Array.isArray(node) ? [...(node as unknown[])] : { ...(isTree(node) ? node : {}) };
  const tree = copy as Tree;
  const next =
    rest.length === 0
      ? value
      : withKey(isTree(node) && Object.hasOwn(node, key) ? (node as Tree)[key] : undefined, rest, value);
  if (next !== undefined) tree[key] = next;
  else if (Array.isArray(copy)) copy.splice(Number(key), 1);
  else delete tree[key];
  return copy;
}

/**
 * A copy of `root` with `value` at `path`; what is not on the way is shared. `undefined` removes the field or list entry.
 * A path through `__proto__` or the like is a programmer's mistake.
 */
export function setAt<T>(root: T, path: string, value: unknown): T {
  const keys = path.split(".");
  if (keys.some((key) => key === "" || key === "__proto__" || key === "constructor" || key === "prototype")) {
    throw new Error(`not a path of a scenario: ${path}`);
  }
  return withKey(root, keys, value) as T;
}

/** `command.points.3.duty` -> `command.points.*.duty`. */
export const generalPath = (path: string): string => path.replace(/\.\d+(?=\.|$)/g, ".*");

/** Index of the row that a path of a list lies in, or undefined. */
export function rowIndex(path: string): number | undefined {
  const match = /\.(\d+)(?=\.|$)/.exec(path);
  return match ? Number(match[1]) : undefined;
}
