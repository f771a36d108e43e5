import { NextResponse, type NextRequest } from "next/server";
import { getToken } from "next-auth/jwt";
import { contentPolicy } from "./lib/server/content-policy";
import { applicationUrl, isSecure } from "./lib/server/env";
import { CORRELATION_HEADER, NONCE_HEADER, PATH_HEADER } from "./lib/server/request";

/** What opens without signing in. Everything else asks for a session first; API routes answer for themselves, with a problem document. */
const PUBLIC = [
  /^\/$/,
  /^\/sign-in$/,
  /^\/join\//,
  /^\/reset$/,
  /^\/s\/[^/]+$/,
  /^\/api\//,
  /\.(?:svg|png|ico|txt|webmanifest|woff2?)$/,
];

/**
 * Before every page: a nonce and the policy that names it, a correlation id, and the way to /sign-in for who has no
 * session cookie. Whether the session behind a cookie still counts is asked of the database by the page (lib/server/actor.ts).
 */
export async function proxy(request: NextRequest): Promise<NextResponse> {
  const elsewhere = toOwnHost(request);
  if (elsewhere) return elsewhere;

  const { pathname, search } = request.nextUrl;
  const nonce = Buffer.from(crypto.randomUUID()).toString("base64");
  const policy = contentPolicy(nonce, process.env.NODE_ENV === "development", isSecure());
  const correlationId = crypto.randomUUID();

  const mayPass =
    PUBLIC.some((pattern) => pattern.test(pathname)) || request.method !== "GET" || (await hasSessionCookie(request));
  if (!mayPass) {
    const signIn = new URL("/sign-in", request.nextUrl);
    signIn.searchParams.set("from", pathname + search);
    return NextResponse.redirect(signIn);
  }
  const headers = new Headers(request.headers);
  headers.set("content-security-policy", policy); // Next reads the nonce for its own scripts from here
  headers.set(NONCE_HEADER, nonce);
  headers.set(CORRELATION_HEADER, correlationId);
  headers.set(PATH_HEADER, pathname + search);
  const response = NextResponse.next({ request: { headers } });
  response.headers.set("content-security-policy", policy);
  response.headers.set(CORRELATION_HEADER, correlationId);
  if (isSecure()) response.headers.set("strict-transport-security", "max-age=31536000; includeSubDomains");
  return response;
}

async function hasSessionCookie(request: NextRequest): Promise<boolean> {
  const token = await getToken({ req: request, secret: process.env.AUTH_SECRET, secureCookie: isSecure() });
  return typeof token?.sessionToken === "string";
}

/**
 * Who comes by 127.0.0.1 while the site is called localhost would sign in on one name and hold no cookie on the other. A
 * redirect would be turned into a relative path (and loop), so the way there is a Refresh header.
 */
function toOwnHost(request: NextRequest): NextResponse | null {
  const own = new URL(applicationUrl());
  const asked = request.headers.get("host");
  if (own.hostname !== "localhost" || request.method !== "GET" || asked !== `127.0.0.1:${own.port}`) return null;
  if (!request.headers.get("accept")?.includes("text/html")) return null;
  const target = own.origin + request.nextUrl.pathname + request.nextUrl.search;
  return new NextResponse(null, { status: 200, headers: { refresh: `0; url=${target}` } });
}

export const config = { matcher: ["/((?!_next/static|_next/image|favicon.ico).*)"] };
