"use client";

import { useId, useRef, useState, type FocusEvent, type KeyboardEvent } from "react";
import { readQuantity, writeQuantity, type QuantityShape } from "./quantity-text";
import styles from "./quantity-field.module.css";

/**
 * A number with a unit, in engineering notation. While typing, the line below says how it will be read; Enter or Tab takes it, Escape
 * puts the old one back, arrows step (Shift ten steps, Alt a tenth), Page Up and Down go to preferred values. What cannot be taken
 * stays in the field, with the range and what is used meanwhile: it is never thrown away and never stops anything.
 */
export type QuantityFieldProps = {
  id?: string;
  /** Accessible name; a visible label may point here with `id` instead. */
  label?: string;
  /** `null`: an optional value that was left out. */
  value: number | null;
  shape: QuantityShape;
  onTake: (value: number) => void;
  /** Present for an optional value: the emptied field leaves it out. */
  onClear?: () => void;
  /** What stands in the emptied field. */
  placeholder?: string;
  /** Arrow and page keys: where a step leads, and what takes it (`onTake` if left out). */
  stepBy: (value: number, direction: 1 | -1, size: number) => number;
  pageBy: (value: number, direction: 1 | -1) => number;
  onStep?: (value: number) => void;
  /** Text that could not be taken, kept by the caller so that it outlives this field. */
  refusedText?: string | null;
  onRefuse?: (text: string | null) => void;
  /** Whose use continues: "The run" in "The run keeps 1 µs." */
  keeper?: string;
  /** What is wrong with the value although it is inside its own range. */
  problem?: string | undefined;
  isDisabled?: boolean;
  /** Id of further text that describes the field. */
  describedBy?: string | undefined;
  className?: string | undefined;
};

export function QuantityField(props: QuantityFieldProps) {
  const { value, shape, onTake, onStep = onTake, refusedText = null, onRefuse, keeper = "The run", problem } = props;
  const shown =
    value === null
      ? { ...writeQuantity(0, shape), number: "", text: props.placeholder ?? "no value" }
      : writeQuantity(value, shape);
  const [typed, setTyped] = useState<string | null>(null);
  const [isTouched, setTouched] = useState(false);
  // Escape on the way out must not take what the blur still sees
  const isRestoring = useRef(false);
  const lineId = useId();

  const text = typed ?? refusedText ?? shown.number;
  const isPending = typed !== null ? isTouched : refusedText !== null;
  const reading = isPending ? readQuantity(text, shape, shown.prefix) : null;
  const isRefused = refusedText !== null && (typed === null || typed === refusedText);
  const line = lineOf({ reading, isRefused, problem, kept: `${keeper} keeps ${shown.text}.` });

  const leave = () => {
    onRefuse?.(null);
    setTyped(null);
    setTouched(false);
  };
  const take = () => {
    if (typed === null || !isTouched || typed === refusedText) return true;
    if (props.onClear && typed.trim() === "") {
      leave();
      if (value !== null) props.onClear();
      return true;
    }
    const result = readQuantity(typed, shape, shown.prefix);
    if (!result.ok) {
      onRefuse?.(typed);
      return false;
    }
    leave();
    if (result.value !== value) onTake(result.value);
    return true;
  };
  const restore = (input: HTMLInputElement) => {
    leave();
    isRestoring.current = true;
    requestAnimationFrame(() => {
      isRestoring.current = false;
      if (document.activeElement === input) input.select();
    });
  };
  const move = (next: number) => {
    leave();
    if (next !== value) onStep(next);
  };
  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
    const input = event.currentTarget;
    if (event.key === "Enter") {
      if (take()) requestAnimationFrame(() => input.select());
    } else if (event.key === "Escape") {
      if (!isPending) return;
      restore(input);
      event.stopPropagation();
    } else if ((event.key === "ArrowUp" || event.key === "ArrowDown") && !event.ctrlKey && !event.metaKey) {
      move(
        props.stepBy(
          startOf(reading, value),
          event.key === "ArrowUp" ? 1 : -1,
          event.shiftKey ? 10 : event.altKey ? 0.1 : 1,
        ),
      );
    } else if (event.key === "PageUp" || event.key === "PageDown") {
      move(props.pageBy(startOf(reading, value), event.key === "PageUp" ? 1 : -1));
    } else return;
    event.preventDefault();
  };
  const onFocus = (event: FocusEvent<HTMLInputElement>) => {
    if (refusedText === null) event.currentTarget.select();
  };
  const onBlur = () => {
    if (!isRestoring.current) take();
    setTyped(null);
    setTouched(false);
  };

  return (
    <>
      <span
        className={`${styles.field} ${props.className ?? ""}`}
        data-fault={isRefused || problem !== undefined || undefined}
        data-pending={(typed !== null && isTouched) || undefined}
        data-disabled={props.isDisabled || undefined}
      >
        <input
          id={props.id}
          type="text"
          inputMode="text"
          autoComplete="off"
          spellCheck={false}
          enterKeyHint="done"
          aria-label={props.label}
          aria-invalid={isRefused || problem !== undefined || undefined}
          aria-describedby={[line ? lineId : null, props.describedBy].filter(Boolean).join(" ") || undefined}
          disabled={props.isDisabled}
          value={text}
          placeholder={props.placeholder}
          onChange={(event) => {
            setTyped(event.currentTarget.value);
            setTouched(true);
          }}
          onKeyDown={onKeyDown}
          onFocus={onFocus}
          onBlur={onBlur}
        />
        <span className={styles.unit}>{isPending && hasLetters(text) ? "" : shown.unit}</span>
      </span>
      {line && (
        <span
          id={lineId}
          className={styles.line}
          data-fault={line.isFault || undefined}
          role={line.isFault ? "alert" : undefined}
        >
          {line.text}
        </span>
      )}
    </>
  );
}

/** A unit or prefix was typed along: the one beside the field would contradict it. */
const hasLetters = (text: string): boolean => /[^\d.,+\-\u2212eE\s]/.test(text);

const startOf = (reading: ReturnType<typeof readQuantity> | null, value: number | null): number =>
  reading?.ok ? reading.value : (value ?? 0);

type LineInput = {
  reading: ReturnType<typeof readQuantity> | null;
  isRefused: boolean;
  problem: string | undefined;
  kept: string;
};

/** The line under the field: how it will be read, why it is not taken, or what is wrong between fields. */
function lineOf({ reading, isRefused, problem, kept }: LineInput): { text: string; isFault: boolean } | null {
  if (isRefused && reading && !reading.ok) return { text: `${reading.text} ${kept}`, isFault: true };
  if (reading?.ok)
    return { text: [`Will read as ${reading.reading}.`, reading.note].filter(Boolean).join(" "), isFault: false };
  if (reading && reading.code === "range") return { text: reading.text, isFault: false };
  if (reading)
    return {
      text: reading.code === "empty" ? "Enter a number. Escape puts the old one back." : reading.text,
      isFault: false,
    };
  return problem === undefined ? null : { text: problem, isFault: true };
}
