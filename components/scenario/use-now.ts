"use client";

import { useEffect, useState } from "react";

/** The time, renewed each minute; `null` on the server and in the first picture, where the reader's clock is not known. */
export function useNow(): number | null {
  const [nowMs, setNow] = useState<number | null>(null);
  useEffect(() => {
    const read = () => setNow(Date.now());
    const first = setTimeout(read);
    const timer = setInterval(read, 60_000);
    return () => {
      clearTimeout(first);
      clearInterval(timer);
    };
  }, []);
  return nowMs;
}
