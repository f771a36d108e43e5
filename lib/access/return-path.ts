/**
 * Where to go after signing in: only a path of this site, never another host. Refuses `//host`, `/\host`, control
 * characters, a scheme, and the sign-in page itself (which would loop).
 */
export function safeReturnPath(value: unknown, fallback = "/scenarios"): string {
  if (typeof value !== "string" || value.length > 512) return fallback;
  if (!value.startsWith("/") || value.startsWith("//") || value.includes("\\")) return fallback;
  if (/[\u0000-\u001f\u007f]/.test(value)) return fallback;
  const base = "http://same.invalid";
  if (!URL.canParse(value, base)) return fallback;
  const url = new URL(value, base);
  // "/x/..//host" is folded to "//host" by the parser: look at what it became, not at what came in.
  if (url.origin !== base || url.pathname.startsWith("//")) return fallback;
  if (url.pathname === "/sign-in" || url.pathname.startsWith("/api/")) return fallback;
  return url.pathname + url.search + url.hash;
}
