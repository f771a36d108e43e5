"use client";

import { Tooltip } from "radix-ui";
import type { ReactNode } from "react";
import { explainFigure, type Explanation } from "@/lib/explain/figures";
import type { FigureName } from "@/lib/explain/figure-list";
import { useScenario, useWorkbench } from "./provider";
import styles from "./figures.module.css";

/** The label of a figure with its "why": formula, numbers put in, source. Choosing it pins the why at the foot of the column. */
export function Why({ name, children }: { name: FigureName; children: ReactNode }) {
  const { store } = useWorkbench();
  const isPinned = useScenario((state) => state.pinnedFigure === name);
  return (
    <Tooltip.Root>
      <Tooltip.Trigger asChild>
        <button
          type="button"
          className={styles.why}
          aria-pressed={isPinned}
          onClick={() => store.getState().pinFigure(isPinned ? null : name)}
        >
          {children}
        </button>
      </Tooltip.Trigger>
      <Tooltip.Portal>
        <Tooltip.Content className={styles.tip} side="left" align="start" sideOffset={8} collisionPadding={12}>
          <WhyOf name={name} />
        </Tooltip.Content>
      </Tooltip.Portal>
    </Tooltip.Root>
  );
}

function WhyOf({ name }: { name: FigureName }) {
  const shown = useScenario((state) => state.shown);
  return shown ? <Explained explanation={explainFigure(name, shown.document, shown.simulation)} /> : null;
}

function Explained({ explanation }: { explanation: Explanation }) {
  return (
    <>
      <b>{explanation.title}</b>
      <span className={styles.formula}>{explanation.formula}</span>
      <span>{explanation.withValues}</span>
      <span className={styles.source}>{explanation.source}</span>
    </>
  );
}

/** The pinned why, at the foot of the column: it stays while the values move. */
export function PinnedWhy() {
  const { store } = useWorkbench();
  const name = useScenario((state) => state.pinnedFigure) as FigureName | null;
  if (name === null) return null;
  return (
    <section className={styles.pinned} aria-label="Why, pinned">
      <WhyOf name={name} />
      <button type="button" className={styles.unpin} onClick={() => store.getState().pinFigure(null)}>
        Unpin
      </button>
    </section>
  );
}
