"use client";

import { DropdownMenu } from "radix-ui";
import { copyFigures, exportCsv, exportDocument, exportPng, exportSvg } from "./exports";
import { useScenario, useWorkbench } from "./provider";
import { useDuplicate } from "./use-duplicate";
import { useLayout } from "./use-layout";
import { useThemeName } from "./use-theme-name";
import type { Opened } from "./workbench-dialogs";
import styles from "./controls.module.css";

type Props = { onOpen: (dialog: Opened) => void; mayDuplicate: boolean };

/** Everything less often needed: in and out, title and tags, copies. What a role may not do is shown, disabled, with the reason. */
export function MoreMenu({ onOpen, mayDuplicate }: Props) {
  const { store, actions } = useWorkbench();
  const theme = useThemeName();
  const mode = useScenario((state) => state.mode);
  const hasRun = useScenario((state) => state.shown !== null);
  const duplicate = useDuplicate();
  const redo = useScenario((state) => state.history.future.at(-1)?.label);
  const isPhone = useLayout() === "phone";
  const png = () =>
    void exportPng(store, theme).catch(() =>
      store.getState().say("This browser could not make the picture; take the SVG instead"),
    );
  return (
    <DropdownMenu.Root>
      <DropdownMenu.Trigger asChild>
        <button type="button" className="button" aria-label="More">
          <svg width="17" height="4" viewBox="0 0 17 4" aria-hidden="true">
            <circle cx="2" cy="2" r="1.7" fill="currentColor" />
            <circle cx="8.5" cy="2" r="1.7" fill="currentColor" />
            <circle cx="15" cy="2" r="1.7" fill="currentColor" />
          </svg>
        </button>
      </DropdownMenu.Trigger>
      <DropdownMenu.Portal>
        <DropdownMenu.Content className={styles.menu} align="end" sideOffset={4} collisionPadding={8}>
          {isPhone && redo !== undefined && <Item onSelect={() => store.getState().redo()} words={`Redo: ${redo}`} />}
          <Item disabled={!hasRun} onSelect={() => void copyFigures(store)} words="Copy figures as text" />
          <Item disabled={!hasRun} onSelect={() => exportCsv(store)} words="CSV of the visible window" />
          <Item disabled={!hasRun} onSelect={() => exportSvg(store, theme)} words="Plots as SVG" />
          <Item disabled={!hasRun} onSelect={png} words="Plots as PNG" />
          <DropdownMenu.Separator className={styles.separator} />
          <Item onSelect={() => exportDocument(store)} words="Export document" />
          <Item onSelect={() => onOpen("import")} words="Import document …" />
          {mode !== "guest" && (
            <>
              <DropdownMenu.Separator className={styles.separator} />
              <Item
                disabled={mode !== "edit" || !actions.renameScenario}
                onSelect={() => onOpen("identity")}
                words="Title and tags …"
                reason={mode === "edit" ? undefined : "not with your role"}
              />
              <Item
                disabled={!mayDuplicate}
                onSelect={() => void duplicate()}
                words="Duplicate"
                reason={mayDuplicate ? undefined : "not with your role"}
              />
              {actions.listKeptDrafts && <Item onSelect={() => onOpen("drafts")} words="Kept drafts …" />}
            </>
          )}
          <DropdownMenu.Separator className={styles.separator} />
          <Item onSelect={() => onOpen("keys")} words="Keys" hint="?" />
        </DropdownMenu.Content>
      </DropdownMenu.Portal>
    </DropdownMenu.Root>
  );
}

type ItemProps = {
  words: string;
  onSelect: () => void;
  disabled?: boolean;
  reason?: string | undefined;
  hint?: string;
};

function Item({ words, onSelect, disabled = false, reason, hint }: ItemProps) {
  return (
    <DropdownMenu.Item className={styles.item} disabled={disabled} onSelect={onSelect}>
      <span>{words}</span>
      {reason ? <small>{reason}</small> : hint ? <kbd>{hint}</kbd> : null}
    </DropdownMenu.Item>
  );
}
