"use client";

import { useRouter } from "next/navigation";
import { duplicateWithChanges } from "./duplicating";
import { useWorkbench } from "./provider";

/** Makes a copy of one's own, changes included, and opens it. */
export function useDuplicate(): () => Promise<void> {
  const { store, actions } = useWorkbench();
  const router = useRouter();
  return async () => {
    const id = await duplicateWithChanges(store, actions);
    if (id) router.push(`/scenarios/${id}`);
  };
}
