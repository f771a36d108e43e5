/** Set by proxy.ts on every request that reaches a page; whatever a browser sends under these names is replaced there. */
export const CORRELATION_HEADER = "x-correlation-id";
export const PATH_HEADER = "x-slackwater-path";
export const NONCE_HEADER = "x-nonce";

/**
 * The address a request came from. Behind reverse proxies (SLACKWATER_PROXY_COUNT of them, each adding one entry) it is
 * that many entries from the end of X-Forwarded-For; entries further left are whatever the visitor wrote.
 */
export function addressOf(headers: Headers): string {
  const entries = (headers.get("x-forwarded-for") ?? "").split(",").map((entry) => entry.trim()).filter(Boolean);
  const proxyCount = Math.max(1, Number(process.env.SLACKWATER_PROXY_COUNT ?? 1) || 1);
  return (entries[entries.length - proxyCount] ?? entries[0] ?? "unknown").slice(0, 64);
}

export const correlationIdOf = (headers: Headers): string => headers.get(CORRELATION_HEADER) ?? crypto.randomUUID();
