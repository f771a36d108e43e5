import { getAt } from "./paths";
import { rangeOf } from "./ranges";

/**
 * Reads single fields of a value that may be no valid document, so that the rules between fields can be checked beside
 * fields that are wrong. A field that cannot be used reads as undefined; one left out reads as its default.
 */
export type Reader = {
  number(path: string): number | undefined;
  word(path: string): string | undefined;
  flag(path: string, fallback: boolean): boolean | undefined;
  has(path: string): boolean;
  /** Number of entries of a list, 0 if it is none. */
  count(path: string): number;
};

export function readerOf(root: unknown): Reader {
  return {
    number(path) {
      const value = getAt(root, path);
      const range = rangeOf(path);
      if (value === undefined) return range?.fallback;
      return typeof value === "number" && Number.isFinite(value) ? value : undefined;
    },
    word(path) {
      const value = getAt(root, path);
      return typeof value === "string" ? value : undefined;
    },
    flag(path, fallback) {
      const value = getAt(root, path);
      if (value === undefined) return fallback;
      return typeof value === "boolean" ? value : undefined;
    },
    has: (path) => getAt(root, path) !== undefined,
    count(path) {
      const value = getAt(root, path);
      return Array.isArray(value) ? value.length : 0;
    },
  };
}
