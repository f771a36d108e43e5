"use client";

import { Dialog } from "radix-ui";
import type { ReactNode } from "react";
import styles from "./controls.module.css";

type Props = { title: string; lead: string; isOpen: boolean; onClose: () => void; isWide?: boolean; children: ReactNode };

/** A dialog of this page: title, one sentence that says what it is for, content. Escape closes it, focus goes back where it was. */
export function WorkbenchDialog({ title, lead, isOpen, onClose, isWide = false, children }: Props) {
  return (
    <Dialog.Root open={isOpen} onOpenChange={(next) => !next && onClose()}>
      <Dialog.Portal>
        <Dialog.Overlay className={styles.overlay} />
        <Dialog.Content className={styles.dialog} data-wide={isWide || undefined}>
          <Dialog.Title className={styles.title}>{title}</Dialog.Title>
          <Dialog.Description className={styles.lead}>{lead}</Dialog.Description>
          {children}
        </Dialog.Content>
      </Dialog.Portal>
    </Dialog.Root>
  );
}
