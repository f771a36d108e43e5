import Link from "next/link";

export default function NotThere() {
  return (
    <main className="mx-auto max-w-xl px-6 py-24">
      <h1>There is nothing at this address</h1>
      <p className="mt-3 text-ink2">It may have been archived, or it belongs to a workspace that you do not have open. Switch the workspace in the menu at the top right, or start from the list.</p>
      <p className="mt-6">
        <Link className="button" data-kind="primary" href="/scenarios">
          Go to the scenarios
        </Link>
      </p>
    </main>
  );
}
