"use client";

import { useEffect } from "react";

export type ToastContent = { text: string; undo?: () => void };

/** One line at the foot of the page that goes after ten seconds; with Undo where the deed can be taken back. */
export function Toast({ content, onDone }: { content: ToastContent | null; onDone: () => void }) {
  useEffect(() => {
    if (!content) return;
    const timer = setTimeout(onDone, 10_000);
    return () => clearTimeout(timer);
  }, [content, onDone]);
  return (
    <div role="status" aria-live="polite">
      {content && (
        <div className="toast">
          <span>{content.text}</span>
          {content.undo && (
            <button
              type="button"
              onClick={() => {
                content.undo?.();
                onDone();
              }}
            >
              Undo
            </button>
          )}
        </div>
      )}
    </div>
  );
}
