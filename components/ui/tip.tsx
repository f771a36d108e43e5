"use client";

import { Tooltip } from "radix-ui";
import { useState, type ReactElement, type ReactNode } from "react";

/**
 * An ink block beside a control: after 400 ms under the pointer, at once on focus or on a tap, which on a screen without a
 * pointer is the only way to it. Esc closes it, and the pointer may enter it.
 */
export function Tip({ words, children }: { words: ReactNode; children: ReactElement }) {
  const [isOpen, setOpen] = useState(false);
  return (
    <Tooltip.Provider delayDuration={400} skipDelayDuration={200}>
      <Tooltip.Root open={isOpen} onOpenChange={setOpen}>
        <Tooltip.Trigger
          asChild
          onClick={(event) => {
            // without this the primitive would close on the press
            event.preventDefault();
            setOpen(true);
          }}
        >
          {children}
        </Tooltip.Trigger>
        <Tooltip.Portal>
          <Tooltip.Content className="tip" sideOffset={6} collisionPadding={12}>
            {words}
          </Tooltip.Content>
        </Tooltip.Portal>
      </Tooltip.Root>
    </Tooltip.Provider>
  );
}
