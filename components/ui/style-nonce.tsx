"use client";

import { getNonce, setNonce } from "get-nonce";

/** Hands the request's nonce to libraries that add style elements; the first page's nonce stays, as the policy does. */
export function StyleNonce({ nonce }: { nonce: string }) {
  if (typeof window !== "undefined" && !getNonce()) setNonce(nonce);
  return null;
}
