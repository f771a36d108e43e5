import { redirect } from "next/navigation";
import type { ReactNode } from "react";
import { Head } from "@/components/shell/head";
import { getWorkspaces, requireScope } from "@/lib/server/actor";
import { chooseWorkspace, signOut } from "./actions";

export default async function WorkLayout({ children }: { children: ReactNode }) {
  const scope = await requireScope();
  const workspaces = await getWorkspaces();
  async function openWorkspace(workspaceId: string): Promise<void> {
    "use server";
    await chooseWorkspace({ workspaceId });
  }
  async function leave(): Promise<void> {
    "use server";
    await signOut();
    redirect("/sign-in");
  }
  return (
    <div className="flex min-h-dvh flex-col">
      <Head userName={scope.userName} workspaces={workspaces} workspaceId={scope.workspaceId} onChooseWorkspace={openWorkspace} onSignOut={leave} />
      <main id="main" tabIndex={-1} className="flex grow flex-col outline-none">
        {children}
      </main>
    </div>
  );
}
