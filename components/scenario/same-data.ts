/** Equality of documents: plain data, compared by content. */

type Tree = Record<string, unknown> | unknown[];

const isTree = (value: unknown): value is Tree => typeof value === "object" && value !== null;
const childOf = (tree: Tree, key: string): unknown =>
  Object.hasOwn(tree, key) ? (tree as Record<string, unknown>)[key] : undefined;

/** A field that is `undefined` counts as left out. */
export function isSameData(one: unknown, other: unknown): boolean {
  if (Object.is(one, other)) return true;
  if (!isTree(one) || !isTree(other) || Array.isArray(one) !== Array.isArray(other)) return false;
  const keys = new Set([...Object.keys(one), ...Object.keys(other)]);
  return [...keys].every((key) => isSameData(childOf(one, key), childOf(other, key)));
}
