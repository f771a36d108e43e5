"use client";

import { Button } from "@/components/ui/button";

export default function BrokenPage({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <main className="mx-auto max-w-xl px-6 py-24">
      <h1>This page could not be shown</h1>
      <p className="mt-3 text-ink2">
        Something failed on our side. Unsaved work in this browser is kept.{error.digest ? ` Reference: ${error.digest}.` : ""}
      </p>
      <p className="mt-6 flex gap-3">
        <Button kind="primary" onClick={reset}>
          Try again
        </Button>
        <a className="button" href="/scenarios">
          Go to the scenarios
        </a>
      </p>
    </main>
  );
}
