"use client";

import { DropdownMenu } from "radix-ui";
import type { ReactElement, ReactNode } from "react";

/** A list of deeds under a control: arrows move, a letter jumps, Esc closes and gives the focus back. */
export function Menu({ trigger, children }: { trigger: ReactElement; children: ReactNode }) {
  return (
    <DropdownMenu.Root modal={false}>
      <DropdownMenu.Trigger asChild>{trigger}</DropdownMenu.Trigger>
      <DropdownMenu.Portal>
        <DropdownMenu.Content align="end" sideOffset={6} collisionPadding={8} className="menu">
          {children}
        </DropdownMenu.Content>
      </DropdownMenu.Portal>
    </DropdownMenu.Root>
  );
}

/** A deed; one that the person may not do stays in sight with its reason. */
export function MenuItem({ onSelect, disabledReason, children }: { onSelect: () => void; disabledReason?: string; children: ReactNode }) {
  return (
    <DropdownMenu.Item className="menu-item" aria-disabled={disabledReason !== undefined || undefined} onSelect={(event) => (disabledReason === undefined ? onSelect() : event.preventDefault())}>
      {children}
      {disabledReason !== undefined && <span className="menu-reason">{disabledReason}</span>}
    </DropdownMenu.Item>
  );
}

/** A link, given as the one child, among the deeds. */
export function MenuLink({ children }: { children: ReactElement }) {
  return (
    <DropdownMenu.Item asChild className="menu-item">
      {children}
    </DropdownMenu.Item>
  );
}

export const MenuLabel = ({ children }: { children: ReactNode }) => <DropdownMenu.Label className="caps px-3 pt-2 pb-1">{children}</DropdownMenu.Label>;
export const MenuRule = () => <DropdownMenu.Separator className="my-1 border-t border-rule" />;
