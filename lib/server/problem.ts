import { errorStatus, errorText, type ErrorCode } from "@/lib/errors";
import type { Finding } from "@/lib/result";

/** A refusal over HTTP as RFC 9457 describes it; every finding keeps its path. `code` is stable, the words are for people. */
export function problem(
  code: ErrorCode,
  more: { findings?: Finding[]; detail?: string; headers?: Record<string, string> } = {},
): Response {
  const body = {
    type: `urn:slackwater:problem:${code}`,
    title: errorText(code),
    status: errorStatus(code),
    ...(more.detail === undefined ? {} : { detail: more.detail }),
    code,
    ...(more.findings === undefined ? {} : { errors: more.findings }),
  };
  return new Response(JSON.stringify(body), {
    status: body.status,
    headers: { "content-type": "application/problem+json", "cache-control": "no-store", ...more.headers },
  });
}
