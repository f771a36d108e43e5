import { sectionInputs, type SectionId } from "@/lib/scenario/inputs";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { formatQuantity } from "@/lib/units/format";
import { LISTS, rowsOf } from "./lists";
import { valueWords } from "./edit-label";

const MOST = 3;

/** A closed section shows its values in one line: "400 µH · 2.2 Ω · 1.5 V". */
export function sectionSummary(section: SectionId, document: ScenarioDocument): string {
  if (section === "faults") return document.faults.length === 0 ? "none" : `${document.faults.length} set`;
  if (section === "command") return dutySummary(document);
  const words = sectionInputs(section, document)
    .filter((input) => !input.isDetail && (input.kind === "quantity" || input.kind === "choice"))
    .map((input) => valueWords(input, document));
  const rows = LISTS.filter((list) => list.section === section).map((list) => rowsOf(document, list.path).length);
  const counted = rows.filter((count) => count > 0).map((count) => (count === 1 ? "1 load" : `${count} loads`));
  const shown = [...words, ...counted].slice(0, MOST);
  return shown.length === 0 ? "none" : shown.join(" · ");
}

function dutySummary(document: ScenarioDocument): string {
  const { points } = document.command;
  const duties = points.slice(0, MOST).map((point) => formatQuantity(point.duty, "share", { digits: 3 }).text);
  return duties.join(", ") + (points.length > MOST ? ", …" : "");
}
