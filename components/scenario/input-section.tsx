"use client";

import { useId, useState } from "react";
import { sectionInputs, type SectionId } from "@/lib/scenario/inputs";
import { LISTS } from "./lists";
import { InputRows } from "./input-rows";
import { ListRows } from "./list-rows";
import { useScenario } from "./provider";
import { sectionSummary } from "./section-summary";
import styles from "./inputs.module.css";

type Props = {
  id: SectionId;
  title: string;
  isOpen: boolean;
  isFull: boolean;
  onOpen: (isOpen: boolean) => void;
  onFull: (isFull: boolean) => void;
};

/** A part of the inputs that opens and closes; closed, it shows its values in one line. */
export function InputSection({ id, title, isOpen, isFull, onOpen, onFull }: Props) {
  const bodyId = useId();
  return (
    <section className={styles.section} aria-label={title} data-section={id}>
      <h3 className={styles.head}>
        <button
          type="button"
          className={styles.toggle}
          aria-expanded={isOpen}
          aria-controls={bodyId}
          onClick={() => onOpen(!isOpen)}
        >
          <Chevron isOpen={isOpen} />
          <span className={styles.caps}>{title}</span>
          {!isOpen && <Summary id={id} />}
        </button>
      </h3>
      <div id={bodyId} hidden={!isOpen}>
        {isOpen && <Body id={id} isFull={isFull} onFull={onFull} />}
      </div>
    </section>
  );
}

function Summary({ id }: { id: SectionId }) {
  const text = useScenario((state) => sectionSummary(id, state.document));
  const isFaulty = useScenario(
    (state) =>
      state.findings.some((finding) => isOfSection(id, finding.path, state)) ||
      Object.keys(state.refusedText).some((path) => isOfSection(id, path, state)),
  );
  return (
    <span className={styles.summary} data-fault={isFaulty || undefined}>
      {isFaulty ? "needs a look" : text}
    </span>
  );
}

type WithDocument = { document: Parameters<typeof sectionInputs>[1] };
const isOfSection = (id: SectionId, path: string, { document }: WithDocument): boolean =>
  sectionInputs(id, document).some((input) => input.path === path) ||
  LISTS.some((list) => list.section === id && path.startsWith(list.path));

function Body({ id, isFull, onFull }: Pick<Props, "id" | "isFull" | "onFull">) {
  const document = useScenario((state) => state.document);
  const [first] = useState(
    () =>
      new Set(
        LISTS.filter((list) => list.path === "command.points" || list.path === "load.shaft").map((list) => list.path),
      ),
  );
  const inputs = sectionInputs(id, document);
  const plain = inputs.filter((input) => !input.isDetail);
  const detail = inputs.filter((input) => input.isDetail);
  const lists = LISTS.filter(
    (list) => list.section === id && (list.path !== "load.shaft" || document.load.kind === "motor"),
  );
  return (
    <>
      {lists
        .filter((list) => first.has(list.path))
        .map((list) => (
          <ListRows key={list.path} list={list} />
        ))}
      <InputRows inputs={plain} />
      {lists
        .filter((list) => !first.has(list.path))
        .map((list) => (
          <ListRows key={list.path} list={list} />
        ))}
      {isFull && <InputRows inputs={detail} />}
      {detail.length > 0 && (
        <button type="button" className={styles.more} aria-expanded={isFull} onClick={() => onFull(!isFull)}>
          {isFull ? "Fewer" : `${detail.length} more`}
        </button>
      )}
    </>
  );
}

function Chevron({ isOpen }: { isOpen: boolean }) {
  return (
    <svg
      className={styles.chevron}
      data-open={isOpen || undefined}
      width="8"
      height="8"
      viewBox="0 0 8 8"
      aria-hidden="true"
    >
      <path d="M2 .8 5.6 4 2 7.2" fill="none" stroke="currentColor" strokeWidth="1.5" />
    </svg>
  );
}
