import { diffDocuments, type Difference } from "./diff";
import { GAIN_KIND_PATH } from "./inputs";
import { mended } from "./mends";
import { getAt, setAt } from "./paths";
import { gainOf, type FaultKind, type Load, type ScenarioDocument } from "./schema";
import { isPart, ROWS_MAX, startOfFault, startOfLoad, startOfPart, startOfRow, type ListPath } from "./starts";

/** Edits of a document as a person makes them. All are pure; the document given is not changed. */

export type AppliedChange = {
  document: ScenarioDocument;
  /** What else had to change, apart from the field itself: to be told to the person. */
  alsoChanged: Difference[];
};

/** Two resistors of the same gain as a fixed one, and back. The filter keeps the resistance it acts with. */
function withGainKind(document: ScenarioDocument, kind: unknown): ScenarioDocument {
  const { amplifier, filter } = document.sensing;
  if (kind === "fixed" && !("fixed" in amplifier.gain)) {
    const fixed = Number(gainOf(amplifier).toPrecision(6));
    const changed = setAt(document, "sensing.amplifier.gain", { fixed });
    return filter ? setAt(changed, "sensing.filter.resistanceOhm", amplifier.gain.outOhm) : changed;
  }
  if (kind !== "resistors" || !("fixed" in amplifier.gain)) return document;
  const inOhm = amplifier.gain.fixed > 1e4 ? 10 : 1000;
  const outOhm = Number((amplifier.gain.fixed * inOhm).toPrecision(6));
  return setAt(document, "sensing.amplifier.gain", { inOhm, outOhm: Math.min(1e7, Math.max(1, outOhm)) });
}

/** Which command points and the like a change of load, fault kind or part replaces as a whole. */
function changed(document: ScenarioDocument, path: string, value: unknown): ScenarioDocument {
  if (path === GAIN_KIND_PATH) return withGainKind(document, value);
  if (path === "load.kind")
    return document.load.kind === value ? document : setAt(document, "load", startOfLoad(value as Load["kind"]));
  if (isPart(path) && typeof value === "boolean") {
    return value === (getAt(document, path) !== undefined)
      ? document
      : setAt(document, path, value ? startOfPart(path, document) : undefined);
  }
  const fault = /^faults\.(\d+)\.kind$/.exec(path);
  if (fault) {
    const old = document.faults[Number(fault[1])];
    return old ? setAt(document, `faults.${fault[1]}`, startOfFault(value as FaultKind, old.atS, document)) : document;
  }
  return setAt(document, path, value);
}

function settled(before: ScenarioDocument, after: ScenarioDocument, path: string): AppliedChange {
  const document = mended(after, path, before);
  const isOwn = (other: string) =>
    other === path || other.startsWith(`${path}.`) || (path === "load.kind" && other.startsWith("load."));
  return { document, alsoChanged: diffDocuments(after, document).filter((difference) => !isOwn(difference.path)) };
}

/**
 * Puts `value` at `path` and makes everything follow that has to, so that choosing a site, a scheme or a load never leaves
 * an impossible combination. A part (`load.gear`, `sensing.reference`, ...) takes true or false; `undefined` clears an
 * optional number. A number out of range is put there as it is: `parseScenario` says what is wrong with it.
 */
export function applyChange(document: ScenarioDocument, path: string, value: unknown): AppliedChange {
  return settled(document, changed(document, path, value), path);
}

/** Appends a row to a list, with values that keep the list in order. A full list stays as it is. */
export function addRow(document: ScenarioDocument, list: ListPath): AppliedChange {
  const rows = (getAt(document, list) ?? []) as unknown[];
  if (rows.length >= ROWS_MAX[list] || (list === "load.shaft" && document.load.kind !== "motor"))
    return { document, alsoChanged: [] };
  return settled(document, setAt(document, list, [...rows, startOfRow(list, document)]), list);
}

/** Removes a row. The first command point stays: a run needs a command from 0 s. */
export function removeRow(document: ScenarioDocument, list: ListPath, index: number): AppliedChange {
  const rows = (getAt(document, list) ?? []) as unknown[];
  if (index < 0 || index >= rows.length || (list === "command.points" && index === 0))
    return { document, alsoChanged: [] };
  return settled(
    document,
    setAt(
      document,
      list,
      rows.filter((_, position) => position !== index),
    ),
    list,
  );
}
