"use client";

import Link from "next/link";
import { useRouter } from "next/navigation";
import { useTransition } from "react";
import { Menu, MenuItem, MenuLabel, MenuLink, MenuRule } from "@/components/ui/menu";
import type { WorkspaceView } from "@/db/queries/people";
import { ROLE_WORDS } from "@/lib/access/table";

const initialsOf = (name: string) =>
  name
    .split(/\s+/)
    .map((part) => part[0] ?? "")
    .slice(0, 2)
    .join("");

type Props = { userName: string; workspaces: WorkspaceView[]; workspaceId: string; onChooseWorkspace: (id: string) => Promise<void>; onSignOut: () => Promise<void> };

/** Person and workspace: switch workspace, account, sign out. */
export function AccountMenu({ userName, workspaces, workspaceId, onChooseWorkspace, onSignOut }: Props) {
  const router = useRouter();
  const [isBusy, start] = useTransition();
  const here = workspaces.find((one) => one.id === workspaceId);
  const open = (id: string) =>
    start(async () => {
      await onChooseWorkspace(id);
      router.push("/scenarios");
      router.refresh();
    });
  return (
    <Menu
      trigger={
        <button type="button" className="button" data-kind="quiet" aria-busy={isBusy} aria-label={`${userName}, ${here?.name ?? ""}: account and workspace`}>
          <span aria-hidden className="grid size-[26px] place-items-center rounded-full border border-edge bg-sheet text-[10.5px] font-semibold text-ink2">
            {initialsOf(userName)}
          </span>
          <span className="text-ink2 max-[899px]:hidden">{userName}</span>
        </button>
      }
    >
      <MenuLabel>Workspace</MenuLabel>
      {workspaces.map((workspace) => (
        <MenuItem key={workspace.id} onSelect={() => open(workspace.id)}>
          <span className="flex gap-6">
            <span className="grow">{workspace.name}</span>
            <span className="opacity-80">
              {ROLE_WORDS[workspace.role].name}
              {workspace.id === workspaceId && ", open"}
            </span>
          </span>
        </MenuItem>
      ))}
      <MenuRule />
      <MenuLink>
        <Link href="/account">Account and sessions</Link>
      </MenuLink>
      <MenuItem onSelect={() => start(() => onSignOut())}>Sign out</MenuItem>
    </Menu>
  );
}
