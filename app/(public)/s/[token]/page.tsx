import type { Metadata } from "next";
import Link from "next/link";
import { notFound } from "next/navigation";
import { ScenarioWorkbench } from "@/components/scenario/scenario-workbench";
import { RefusedLink } from "@/components/share/refused-link";
import { PublicHead } from "@/components/shell/public-head";
import { db } from "@/db/client";
import { getAddress } from "@/lib/server/actor";
import { openShareLinkFrom } from "@/lib/server/share";

export const metadata: Metadata = { title: "Shared scenario", robots: { index: false } };

export default async function SharedPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const opened = await openShareLinkFrom(db, await getAddress(), token);
  if (!opened.ok && opened.code === "link.unknown") notFound();
  if (!opened.ok) return <RefusedLink code={opened.code} />;
  const { title, document, revisionNumber, follows, workspaceName, label } = opened.value;
  return (
    <div className="flex min-h-dvh flex-col">
      <PublicHead>
        <Link className="button" href="/sign-in">
          Sign in
        </Link>
      </PublicHead>
      <p className="border-b border-rule bg-sheet px-5 py-2 text-ink2 max-[719px]:px-3">
        Shared by <b className="font-semibold text-ink">{workspaceName}</b>
        {label && ` as “${label}”`}: revision {revisionNumber}
        {follows === "newest" ? ", always the newest" : ", pinned"}. Play with the values; nothing you change is kept.
      </p>
      <main id="main" tabIndex={-1} className="flex grow flex-col outline-none">
        <ScenarioWorkbench initial={{ scenarioId: null, personId: null, mode: "guest", title, tags: [], base: { number: revisionNumber, document, savedAtMs: 0, authorName: workspaceName } }} />
      </main>
    </div>
  );
}
