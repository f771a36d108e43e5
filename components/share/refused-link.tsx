import Link from "next/link";
import { PublicHead } from "@/components/shell/public-head";
import { errorText, type ErrorCode } from "@/lib/errors";

const TITLES: Partial<Record<ErrorCode, string>> = {
  "link.unknown": "This link leads nowhere",
  "link.expired": "This link has expired",
  "link.revoked": "This link was withdrawn",
  "limit.reached": "Too many links tried from here",
};

/** The page of a link that opens nothing: which it is, and the two ways on. */
export function RefusedLink({ code }: { code: ErrorCode }) {
  return (
    <div className="min-h-dvh">
      <PublicHead />
      <main id="main" className="mx-auto max-w-xl px-6 py-20">
        <h1>{TITLES[code] ?? "This link cannot be opened"}</h1>
        <p className="mt-3 text-ink2">{errorText(code)}</p>
        <p className="mt-6 flex flex-wrap gap-3">
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
