"use client";

import { memo, useId, useMemo } from "react";
import { writeQuantity, type QuantityShape } from "@/components/ui/quantity-text";
import { QuantityField } from "@/components/ui/quantity-field";
import { Slider } from "@/components/ui/slider";
import type { QuantityInput } from "@/lib/scenario/inputs";
import { getAt } from "@/lib/scenario/paths";
import { pageStepped, sliderPosition, snapped, stepped, valueAtPosition } from "@/lib/scenario/sliders";
import { FieldNote } from "./field-note";
import { preferredPositions } from "./preferred-positions";
import { useScenario, useWorkbench } from "./provider";
import { QuantitySymbol } from "./symbol";
import styles from "./inputs.module.css";

const shapeOf = ({ unit, min, max, isMaxOpen, isWhole }: QuantityInput): QuantityShape => ({
  unit,
  min,
  max,
  isMaxOpen,
  isWhole,
});

/** One number of the document: label, symbol, field, and the hairline below it as its slider. */
export const QuantityRow = memo(function QuantityRow({
  input,
  label = input.label,
}: {
  input: QuantityInput;
  label?: string;
}) {
  const { path } = input;
  const { store } = useWorkbench();
  const value = useScenario((state) => asNumber(getAt(state.document, path)));
  const base = useScenario((state) => asNumber(getAt(state.base.document, path)));
  const refused = useScenario((state) => state.refusedText[path] ?? null);
  const problem = useScenario((state) => state.findings.find((finding) => finding.path === path)?.text);
  const start = useScenario((state) =>
    state.gesture?.path === path
      ? asNumber(getAt(state.gesture.before, path))
      : state.dragStart?.path === path
        ? state.dragStart.value
        : null,
  );
  const isLocked = useScenario((state) => state.isLocked);
  const id = useId();
  const shape = shapeOf(input);
  const ticks = useMemo(() => preferredPositions(input), [input]);
  const { slider } = input;
  const write = (one: number | null) => (one === null ? "left out" : writeQuantity(one, shape).text);
  const act = store.getState;
  const isChanged = value !== base;
  const keys = {
    onStep: (next: number) => act().nudge(path, next),
    stepBy: (one: number, direction: 1 | -1, size: number) => stepped(input, one, direction, size),
    pageBy: (one: number, direction: 1 | -1) => pageStepped(input, one, direction),
  };
  return (
    <div
      className={styles.row}
      data-row=""
      data-path={path}
      data-changed={isChanged || undefined}
      title={isChanged ? `Changed in this draft, was ${write(base)}` : undefined}
    >
      <label htmlFor={id} className={styles.label}>
        {label}
        {input.symbol && <QuantitySymbol symbol={input.symbol} />}
      </label>
      {isLocked ? (
        <output id={id} className={styles.fixed}>
          {write(value)}
        </output>
      ) : (
        <QuantityField
          id={id}
          value={value}
          shape={shape}
          className={styles.value}
          refusedText={refused}
          onRefuse={(text) => act().refuseText(path, text)}
          onTake={(next) => act().change(path, next)}
          {...keys}
          {...(input.isOptional ? { onClear: () => act().change(path, undefined), placeholder: "left out" } : {})}
          problem={problem}
          describedBy={input.help ? `${id}-help` : undefined}
        />
      )}
      {input.help && <FieldNote id={`${id}-help`} text={input.help} />}
      {slider && value !== null && !isLocked && (
        <Slider
          {...keys}
          label={input.name}
          value={value}
          valueText={write(value)}
          min={slider.min}
          max={slider.max}
          position={sliderPosition(slider, value)}
          startPosition={start === null || start === value ? null : sliderPosition(slider, start)}
          ticks={ticks}
          valueAt={(position, snapShare) => snapped(input, valueAtPosition(input, position), snapShare)}
          resetValue={base}
          onStart={() => act().beginDrag(path)}
          onMove={(next) => act().drag(path, next)}
          onEnd={() => act().endDrag()}
          onCancel={() => act().cancelDrag()}
        />
      )}
    </div>
  );
}, isSameInput);

/** Inputs are made anew with each document; a row cares for what it shows. */
export function isSameInput(
  one: { input: QuantityInput; label?: string },
  other: { input: QuantityInput; label?: string },
): boolean {
  const [a, b] = [one.input, other.input];
  return (
    a.path === b.path &&
    a.unit === b.unit &&
    a.min === b.min &&
    a.max === b.max &&
    a.name === b.name &&
    one.label === other.label
  );
}

const asNumber = (value: unknown): number | null => (typeof value === "number" ? value : null);
