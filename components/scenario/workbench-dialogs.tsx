"use client";

import { ConflictDialog } from "./conflict-dialog";
import { IdentityDialog } from "./identity-dialog";
import { ImportDialog } from "./import-dialog";
import { KeptDraftsDialog } from "./kept-drafts-dialog";
import { KeysDialog } from "./keys-dialog";
import { SaveDialog } from "./save-dialog";

export type Opened = "save" | "conflict" | "import" | "identity" | "drafts" | "keys";

/** The one dialog that is open, if any; each starts afresh when it opens. */
export function WorkbenchDialogs({ opened, onClose }: { opened: Opened | null; onClose: () => void }) {
  switch (opened) {
    case "save":
      return <SaveDialog onClose={onClose} />;
    case "conflict":
      return <ConflictDialog onClose={onClose} />;
    case "import":
      return <ImportDialog onClose={onClose} />;
    case "identity":
      return <IdentityDialog onClose={onClose} />;
    case "drafts":
      return <KeptDraftsDialog onClose={onClose} />;
    case "keys":
      return <KeysDialog onClose={onClose} />;
    case null:
      return null;
  }
}
