"use client";

import { useRef, useState } from "react";
import { Button } from "@/components/ui/button";

/** The address of a link just made. Only a hash of it is kept, so this is the one place and time to take it. */
export function MadeLink({ label, url }: { label: string; url: string }) {
  const field = useRef<HTMLInputElement>(null);
  const [said, setSaid] = useState("");
  async function copy() {
    try {
      await navigator.clipboard.writeText(url);
      setSaid("Copied.");
    } catch {
      // no permission, or no clipboard outside a secure page: the person's own copy key still works
      field.current?.select();
      setSaid("This browser does not let the page copy. The link is selected: copy it with the keyboard.");
    }
  }
  return (
    <section aria-label="New link" className="my-4 border border-ink bg-sheet p-3">
      <p className="font-medium">“{label}” is ready. The link is shown only once: copy it now.</p>
      <div className="mt-2 flex gap-2">
        <input ref={field} readOnly autoFocus aria-label="Link" className="text-input grow" value={url} onFocus={(event) => event.currentTarget.select()} />
        <Button className="h-[34px]!" onClick={() => void copy()}>
          Copy the link
        </Button>
      </div>
      <p role="status" className="mt-1 min-h-[18px] text-ink2">
        {said}
      </p>
    </section>
  );
}
