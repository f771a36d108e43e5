"use client";

import { Button } from "@/components/ui/button";

export default function BrokenList({ reset }: { error: Error; reset: () => void }) {
  return (
    <div className="px-8 py-10 max-[719px]:px-4">
      <h1>The list could not be loaded</h1>
      <p className="mt-3 text-ink2">The database did not answer. Nothing was changed.</p>
      <p className="mt-5">
        <Button kind="primary" onClick={reset}>
          Load again
        </Button>
      </p>
    </div>
  );
}
