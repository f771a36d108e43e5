"use client";

import { useCallback, useMemo } from "react";
import { Toast } from "@/components/ui/toast";
import { useScenario, useWorkbench } from "./provider";

/** The last thing done, in words, with its way back for ten seconds. */
export function SaidLine() {
  const { store } = useWorkbench();
  const said = useScenario((state) => state.said);
  const content = useMemo(
    () => said && { text: said.text, ...(said.canUndo ? { undo: () => store.getState().undo() } : {}) },
    [said, store],
  );
  const onDone = useCallback(() => store.getState().unsay(), [store]);
  return <Toast content={content} onDone={onDone} />;
}
