"use client";

import { useEffect, useRef, useState } from "react";
import { inputAt, SECTIONS, type SectionId } from "@/lib/scenario/inputs";
import { LISTS } from "./lists";
import { InputSection } from "./input-section";
import { useScenario } from "./provider";
import styles from "./inputs.module.css";

/** What a page opens with: the drive and the shunt, which are tuned most. */
const OPEN: readonly SectionId[] = ["command", "sensing", "amplifier"];

/** The section that holds a path, whether it names an input, a list or an entry of one. */
export function sectionOf(path: string): SectionId | undefined {
  const input = inputAt(path);
  if (input) return input.section;
  const list = LISTS.find((one) => path.startsWith(one.path));
  if (list) return list.section;
  return SECTIONS.find((section) => path.split(".").includes(section.id))?.id;
}

/** All inputs of the scenario. A wish for a field (from a notice or a finding) opens its section and focuses it. */
export function InputsPanel() {
  const [open, setOpen] = useState<ReadonlySet<SectionId>>(() => new Set(OPEN));
  const [full, setFull] = useState<ReadonlySet<SectionId>>(() => new Set());
  const wanted = useScenario((state) => state.wantedPath);
  const [servedId, setServedId] = useState(0);
  const root = useRef<HTMLDivElement>(null);

  if (wanted && wanted.id !== servedId) {
    setServedId(wanted.id);
    const section = sectionOf(wanted.path);
    if (section) {
      setOpen(changed(open, section, true));
      if (inputAt(wanted.path)?.isDetail) setFull(changed(full, section, true));
    }
  }
  useEffect(() => {
    if (wanted) focusField(root.current, wanted.path);
  }, [wanted]);

  return (
    <div ref={root} className={styles.panel}>
      {SECTIONS.map((section) => (
        <InputSection
          key={section.id}
          id={section.id}
          title={section.title}
          isOpen={open.has(section.id)}
          isFull={full.has(section.id)}
          onOpen={(isOpen) => setOpen(changed(open, section.id, isOpen))}
          onFull={(isFull) => setFull(changed(full, section.id, isFull))}
        />
      ))}
    </div>
  );
}

function changed(set: ReadonlySet<SectionId>, id: SectionId, isIn: boolean): ReadonlySet<SectionId> {
  const next = new Set(set);
  isIn ? next.add(id) : next.delete(id);
  return next;
}

/** Focuses the field of a path, else one inside it, else one beside it in the part that holds it. */
function focusField(root: HTMLElement | null, path: string): void {
  if (!root) return;
  let at = path;
  while (at !== "") {
    const row = `:is([data-path="${CSS.escape(at)}"], [data-path^="${CSS.escape(at)}."])`;
    // of a part with several fields the first number is what a notice means
    const field =
      root.querySelector<HTMLElement>(`${row} input[type=text]`) ??
      root.querySelector<HTMLElement>(`${row} :is(input, select)`);
    if (field) {
      field.scrollIntoView?.({ block: "center" });
      field.focus();
      return;
    }
    at = at.includes(".") ? at.slice(0, at.lastIndexOf(".")) : "";
  }
}
