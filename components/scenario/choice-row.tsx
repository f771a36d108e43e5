"use client";

import { useId } from "react";
import {
  choiceLabel,
  choicesAt,
  inputValue,
  type ChoiceInput,
  type FlagInput,
  type PartInput,
} from "@/lib/scenario/inputs";
import { FieldNote } from "./field-note";
import { useScenario, useWorkbench } from "./provider";
import styles from "./inputs.module.css";

/** A choice of the document as a plain select: it works the same by mouse, key and thumb. */
export function ChoiceRow({ input }: { input: ChoiceInput }) {
  const { path } = input;
  const { store } = useWorkbench();
  const value = useScenario((state) => asText(inputValue(input, state.document)));
  const base = useScenario((state) => asText(inputValue(input, state.base.document)));
  const document = useScenario((state) => state.document);
  const problem = useScenario((state) => state.findings.find((finding) => finding.path === path)?.text);
  const isLocked = useScenario((state) => state.isLocked);
  const id = useId();
  const choices = choicesAt(path, document);
  const hint = choices.find((choice) => choice.value === value)?.hint ?? input.help;
  const isOptional = value === "";
  return (
    <div
      className={styles.row}
      data-row=""
      data-path={path}
      data-changed={value !== base || undefined}
      title={value === base ? undefined : `Changed in this draft, was ${choiceLabel(path, base)}`}
    >
      <label htmlFor={id} className={styles.label}>
        {input.label}
      </label>
      {isLocked ? (
        <output id={id} className={styles.fixed}>
          {choiceLabel(path, value)}
        </output>
      ) : (
        <select
          id={id}
          className={styles.select}
          value={value}
          aria-invalid={problem ? true : undefined}
          aria-describedby={hint ? `${id}-help` : undefined}
          onChange={(event) => store.getState().change(path, event.currentTarget.value)}
        >
          {isOptional && <option value="">left out</option>}
          {choices.map((choice) => (
            <option key={choice.value} value={choice.value}>
              {choice.label}
            </option>
          ))}
        </select>
      )}
      {problem && (
        <span role="alert" className={styles.problem}>
          {problem}
        </span>
      )}
      {hint && <FieldNote id={`${id}-help`} text={hint} />}
    </div>
  );
}

/** Something that is so or not: a flag of the document, or a part that is there or left out. */
export function SwitchRow({ input }: { input: FlagInput | PartInput }) {
  const { path } = input;
  const { store } = useWorkbench();
  const isOn = useScenario((state) => inputValue(input, state.document) === true);
  const wasOn = useScenario((state) => inputValue(input, state.base.document) === true);
  const problem = useScenario((state) => state.findings.find((finding) => finding.path === path)?.text);
  const isLocked = useScenario((state) => state.isLocked);
  const id = useId();
  return (
    <div
      className={styles.row}
      data-row=""
      data-path={path}
      data-changed={isOn !== wasOn || undefined}
      title={isOn === wasOn ? undefined : `Changed in this draft, was ${wasOn ? "on" : "off"}`}
    >
      <label htmlFor={id} className={styles.label}>
        {input.label}
      </label>
      <span className={styles.switch}>
        <span aria-hidden="true">{isOn ? "yes" : "no"}</span>
        <input
          id={id}
          type="checkbox"
          role="switch"
          checked={isOn}
          disabled={isLocked}
          aria-describedby={input.help ? `${id}-help` : undefined}
          onChange={(event) => store.getState().change(path, event.currentTarget.checked)}
        />
      </span>
      {problem && (
        <span role="alert" className={styles.problem}>
          {problem}
        </span>
      )}
      {input.help && <FieldNote id={`${id}-help`} text={input.help} />}
    </div>
  );
}

const asText = (value: unknown): string => (typeof value === "string" ? value : "");
