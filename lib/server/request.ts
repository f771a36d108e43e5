/** Set by proxy.ts on every request that reaches a page; whatever a browser sends under these names is replaced there. */
export const CORRELATION_HEADER = "x-correlation-id";
export const PATH_HEADER = "x-slackwater-path";
export const NONCE_HEADER = "x-nonce";

/**
 * The address a request came from: the last entry of X-Forwarded-For, which client-address.ts makes the connection's own.
 * Behind reverse proxies (SLACKWATER_PROXY_COUNT of them, each adding one entry) it stands that many entries further left;
 * entries left of that are whatever the visitor wrote.
 */
export function addressOf(headers: Headers): string {
  const entries = (headers.get("x-forwarded-for") ?? "").split(",").map((entry) => entry.trim());
  const proxyCount = Math.max(0, Math.trunc(Number(process.env.SLACKWATER_PROXY_COUNT)) || 0);
  return (entries[entries.length - 1 - proxyCount] || entries[0] || "unknown").slice(0, 64);
}

export const correlationIdOf = (headers: Headers): string => headers.get(CORRELATION_HEADER) ?? crypto.randomUUID();
