import { diffDocuments, type Difference } from "./diff";
import { GAIN_KIND_PATH } from "./inputs";
import { mended } from "./mends";
import { getAt, setAt } from "./paths";
import { gainOf, type FaultKind, type Load, type ScenarioDocument, type ShaftEntry } from "./schema";
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

/** Power of speed with which a shaft load grows, by its kind. */
const SPEED_POWERS: Readonly<Record<ShaftEntry["kind"], number>> = {
  none: 0,
  constant: 0,
  active: 0,
  viscous: 1,
  fan: 2,
};

/** Another kind of shaft load with about the torque that it had: 0.2 N·m of friction is no 0.2 N·m·s²/rad² of fan. */
function withShaftKind(document: ScenarioDocument, index: number, kind: ShaftEntry["kind"]): ScenarioDocument {
  const entry = document.load.kind === "motor" ? document.load.shaft[index] : undefined;
  if (!entry) return document;
  const speed = Math.max(10, Math.abs(document.initial.speedRadPerS));
  const torqueNm = Math.abs(entry.value) * speed ** SPEED_POWERS[entry.kind] || 0.1;
  const value = kind === "none" ? 0 : Number((torqueNm / speed ** SPEED_POWERS[kind]).toPrecision(3));
  return setAt(document, `load.shaft.${index}`, { ...entry, kind, value });
}

/** The edit itself; a change of load, of a kind or of a part replaces more than the one field. */
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
  const shaft = /^load\.shaft\.(\d+)\.kind$/.exec(path);
  if (shaft) return withShaftKind(document, Number(shaft[1]), value as ShaftEntry["kind"]);
  return setAt(document, path, value);
}

function settled(before: ScenarioDocument, after: ScenarioDocument, path: string): AppliedChange {
  const document = mended(after, path, before);
  const row = /^(?:faults|load\.shaft)\.\d+(?=\.kind$)/.exec(path)?.[0];
  const isOwn = (other: string) =>
    (row !== undefined && other.startsWith(`${row}.`)) ||
    other === path ||
    other.startsWith(`${path}.`) ||
    (path === "load.kind" && other.startsWith("load."));
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
