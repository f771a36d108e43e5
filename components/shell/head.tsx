import Link from "next/link";
import type { WorkspaceView } from "@/db/queries/people";
import { Mark } from "@/components/ui/signs";
import { AccountMenu } from "./account-menu";
import { Places } from "./places";
import { ThemeSwitch } from "./theme-switch";

type Props = { userName: string; workspaces: WorkspaceView[]; workspaceId: string; onChooseWorkspace: (id: string) => Promise<void>; onSignOut: () => Promise<void> };

/** The head of every page behind sign-in: name, places, theme, person; the graduated border under it. */
export function Head({ userName, workspaces, workspaceId, onChooseWorkspace, onSignOut }: Props) {
  return (
    <>
      <a href="#main" className="skip-link button">
        Skip to the page
      </a>
      <header className="flex h-head items-center gap-5 px-5 max-[719px]:gap-2 max-[719px]:px-3">
        <Link href="/scenarios" className="flex items-center gap-2 font-serif text-[19px]/[24px] font-medium no-underline">
          <Mark />
          <span className="max-[430px]:sr-only">Slackwater</span>
        </Link>
        <Places />
        <span className="grow" />
        <ThemeSwitch />
        <AccountMenu userName={userName} workspaces={workspaces} workspaceId={workspaceId} onChooseWorkspace={onChooseWorkspace} onSignOut={onSignOut} />
      </header>
      <div className="graduated" aria-hidden />
    </>
  );
}
