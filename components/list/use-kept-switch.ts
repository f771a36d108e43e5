"use client";

import { useCallback, useSyncExternalStore } from "react";

function subscribe(onChange: () => void): () => void {
  window.addEventListener("storage", onChange);
  return () => window.removeEventListener("storage", onChange);
}

function read(name: string): boolean {
  try {
    return localStorage.getItem(name) !== "off";
  } catch {
    // a browser that keeps nothing: on, as for a first visit
    return true;
  }
}

/** A switch that this browser remembers; on until it is switched off. */
export function useKeptSwitch(name: string): [boolean, (isOn: boolean) => void] {
  const isOn = useSyncExternalStore(subscribe, () => read(name), () => true);
  const change = useCallback(
    (next: boolean) => {
      localStorage.setItem(name, next ? "on" : "off");
      // the browser tells other tabs only
      window.dispatchEvent(new StorageEvent("storage", { key: name }));
    },
    [name],
  );
  return [isOn, change];
}
