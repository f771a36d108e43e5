"use client";

import Link from "next/link";
import { Menu, MenuItem, MenuLink } from "@/components/ui/menu";
import type { ScenarioRow } from "@/db/queries/scenarios";

export type RowDeeds = { onDuplicate: (row: ScenarioRow) => void; onExport: (row: ScenarioRow) => void; onArchive: (row: ScenarioRow) => void };

/** What can be done to a scenario of the list. */
export function RowMenu({ row, deeds }: { row: ScenarioRow; deeds: RowDeeds }) {
  return (
    <Menu
      trigger={
        <button type="button" className="button" data-kind="quiet" aria-label={`Actions for ${row.title}`}>
          •••
        </button>
      }
    >
      <MenuLink>
        <Link href={`/scenarios/${row.id}`}>Open</Link>
      </MenuLink>
      <MenuItem onSelect={() => deeds.onDuplicate(row)} disabledReason={row.mayDuplicate ? undefined : "Your role does not copy this scenario."}>
        Duplicate
      </MenuItem>
      <MenuItem onSelect={() => deeds.onExport(row)}>Export</MenuItem>
      <MenuItem onSelect={() => deeds.onArchive(row)} disabledReason={row.mayArchive ? undefined : "Your role archives only what is its own."}>
        {row.isArchived ? "Restore" : "Archive"}
      </MenuItem>
    </Menu>
  );
}
