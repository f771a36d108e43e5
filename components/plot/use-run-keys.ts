"use client";

import { useState, type KeyboardEvent, type RefObject } from "react";
import { commandOfKey, type RunCommand } from "./run-commands";

const isTyping = (target: EventTarget): boolean => target instanceof HTMLElement && target.closest("input, select, textarea, [contenteditable]") !== null;

/** Space on a button presses it; elsewhere it plays. */
const isPress = (event: KeyboardEvent): boolean => event.key === " " && event.target instanceof HTMLElement && event.target.closest("button, summary") !== null;

/** Keys of the run: Enter goes into the lanes, Escape leaves them, everything else as the key map says. */
export function useRunKeys(rootRef: RefObject<HTMLElement | null>, framesRef: RefObject<HTMLElement | null>, areLettersOn: boolean, onCommand: (command: RunCommand) => void) {
  const [isInside, setInside] = useState(false);
  const onKeyDown = (event: KeyboardEvent<HTMLElement>) => {
    if (isTyping(event.target)) return;
    if (event.key === "Escape" && isInside) {
      setInside(false);
      rootRef.current?.focus();
    } else if (event.key === "Enter" && event.target === rootRef.current) {
      setInside(true);
      requestAnimationFrame(() => framesRef.current?.querySelector<HTMLElement>("[data-lane]")?.focus());
    } else {
      const command = commandOfKey(event, areLettersOn);
      if (command === null || isPress(event)) return;
      onCommand(command);
    }
    event.preventDefault();
  };
  return { isInside, onKeyDown };
}
