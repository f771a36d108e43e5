/**
 * Level lines of a field that rises with the row: for every column the place where a row's value passes the level. Good
 * for the current after a command, which rises with the duty; columns where it does not reach the level are left out.
 * @param field rows of equal length, ascending along the rows @returns per column the fractional row, or null
 */
export function levelAlongColumns(field: readonly (readonly number[])[], level: number): (number | null)[] {
  const columns = field[0]?.length ?? 0;
  return Array.from({ length: columns }, (_, c) => {
    if (field[0]![c]! > level || field[field.length - 1]![c]! < level) return null;
    for (let r = 1; r < field.length; r++) {
      const low = field[r - 1]![c]!;
      const high = field[r]![c]!;
      if (high >= level && high > low) return r - 1 + (level - low) / (high - low);
    }
    return null;
  });
}

/** Parts of a line without gaps, as points. */
export function unbroken(line: readonly (number | null)[]): { column: number; row: number }[][] {
  const parts: { column: number; row: number }[][] = [];
  let part: { column: number; row: number }[] = [];
  line.forEach((row, column) => {
    if (row === null) {
      if (part.length > 1) parts.push(part);
      part = [];
    } else part.push({ column, row });
  });
  if (part.length > 1) parts.push(part);
  return parts;
}
