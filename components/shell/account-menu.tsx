"use client";

import { DropdownMenu } from "radix-ui";
import Link from "next/link";
import { useRouter } from "next/navigation";
import { useTransition } from "react";
import type { WorkspaceView } from "@/db/queries/people";

const initialsOf = (name: string) =>
  name
    .split(/\s+/)
    .map((part) => part[0] ?? "")
    .slice(0, 2)
    .join("");

const ITEM = "flex w-full items-center gap-2 px-3 py-[7px] no-underline outline-none data-[highlighted]:bg-ink data-[highlighted]:text-on-ink max-[719px]:py-3";

type Props = { userName: string; workspaces: WorkspaceView[]; workspaceId: string; onChooseWorkspace: (id: string) => Promise<void>; onSignOut: () => Promise<void> };

/** Person and workspace: switch workspace, account, sign out. */
export function AccountMenu({ userName, workspaces, workspaceId, onChooseWorkspace, onSignOut }: Props) {
  const router = useRouter();
  const [isBusy, start] = useTransition();
  const here = workspaces.find((one) => one.id === workspaceId);
  return (
    <DropdownMenu.Root>
      <DropdownMenu.Trigger className="button" data-kind="quiet" aria-busy={isBusy} aria-label={`${userName}, ${here?.name ?? ""}: account and workspace`}>
        <span aria-hidden className="grid size-[26px] place-items-center rounded-full border border-edge bg-sheet text-[10.5px] font-semibold text-ink2">
          {initialsOf(userName)}
        </span>
        <span className="text-ink2 max-[899px]:hidden">{userName}</span>
      </DropdownMenu.Trigger>
      <DropdownMenu.Portal>
        <DropdownMenu.Content align="end" sideOffset={6} className="z-30 min-w-60 border border-ink bg-sheet py-1">
          <DropdownMenu.Label className="caps px-3 pt-2 pb-1">Workspace</DropdownMenu.Label>
          {workspaces.map((workspace) => (
            <DropdownMenu.Item
              key={workspace.id}
              className={ITEM}
              onSelect={() =>
                start(async () => {
                  await onChooseWorkspace(workspace.id);
                  router.push("/scenarios");
                  router.refresh();
                })
              }
            >
              <span className="grow">{workspace.name}</span>
              <span className="opacity-80">{workspace.id === workspaceId ? `${workspace.role}, open` : workspace.role}</span>
            </DropdownMenu.Item>
          ))}
          <DropdownMenu.Separator className="my-1 border-t border-rule" />
          <DropdownMenu.Item asChild className={ITEM}>
            <Link href="/account">Account and sessions</Link>
          </DropdownMenu.Item>
          <DropdownMenu.Item className={ITEM} onSelect={() => start(() => onSignOut())}>
            Sign out
          </DropdownMenu.Item>
        </DropdownMenu.Content>
      </DropdownMenu.Portal>
    </DropdownMenu.Root>
  );
}
