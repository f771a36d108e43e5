"use client";

import { Dialog as Primitive } from "radix-ui";
import type { ReactNode } from "react";

type Props = { isOpen: boolean; onClose: () => void; title: string; description?: string; size?: "wide"; children: ReactNode };

/** A modal sheet: title, one sentence, content. Esc and the veil close it; focus goes back to where it came from. */
export function Dialog({ isOpen, onClose, title, description, size, children }: Props) {
  return (
    <Primitive.Root open={isOpen} onOpenChange={(open) => !open && onClose()}>
      <Primitive.Portal>
        <Primitive.Overlay className="dialog-veil" />
        <Primitive.Content className="dialog" data-size={size} {...(description ? {} : { "aria-describedby": undefined })}>
          <div className="flex items-start gap-4">
            <Primitive.Title asChild>
              <h2 className="grow text-[22px]/[28px]">{title}</h2>
            </Primitive.Title>
            <Primitive.Close className="button" data-kind="quiet" aria-label="Close">
              Close
            </Primitive.Close>
          </div>
          {description && <Primitive.Description className="mt-1 mb-4 text-ink2">{description}</Primitive.Description>}
          {children}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}
