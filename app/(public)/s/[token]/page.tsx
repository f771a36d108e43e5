import type { Metadata } from "next";
import Link from "next/link";
import { ScenarioWorkbench } from "@/components/scenario/scenario-workbench";
import { PublicHead } from "@/components/shell/public-head";
import { db } from "@/db/client";
import { errorText, type ErrorCode } from "@/lib/errors";
import { getAddress } from "@/lib/server/actor";
import { openShareLinkFrom } from "@/lib/server/share";

export const metadata: Metadata = { title: "Shared scenario", robots: { index: false } };

const REFUSED: Partial<Record<ErrorCode, string>> = {
  "link.unknown": "This link leads nowhere",
  "link.expired": "This link has expired",
  "link.revoked": "This link was withdrawn",
  "limit.reached": "Too many links tried from here",
};

export default async function SharedPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const opened = await openShareLinkFrom(db, await getAddress(), token);
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

function RefusedLink({ code }: { code: ErrorCode }) {
  return (
    <div className="min-h-dvh">
      <PublicHead />
      <main id="main" className="mx-auto max-w-xl px-6 py-20">
        <h1>{REFUSED[code] ?? "This link cannot be opened"}</h1>
        <p className="mt-3 text-ink2">{errorText(code)}</p>
        <p className="mt-6 flex gap-3">
          <Link className="button" data-kind="primary" href="/">
            See what Slackwater does
          </Link>
          <Link className="button" href="/sign-in">
            Sign in
          </Link>
        </p>
      </main>
    </div>
  );
}
