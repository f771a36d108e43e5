import { failure, success, type Result } from "@/lib/result";

/** The JSON body of a request, of at most `byteCountMax` bytes however it is sent: a wrong Content-Length changes nothing. */
export async function readJsonBody(request: Request, byteCountMax: number): Promise<Result<unknown>> {
  const type = request.headers.get("content-type")?.split(";")[0]?.trim().toLowerCase();
  if (type !== "application/json") return failure("input.media-type");
  const chunks: Uint8Array[] = [];
  let byteCount = 0;
  const reader = request.body?.getReader();
  while (reader) {
    const { done, value } = await reader.read();
    if (done) break;
    byteCount += value.byteLength;
    if (byteCount > byteCountMax) {
      await reader.cancel();
      return failure("input.too-large");
    }
    chunks.push(value);
  }
  try {
    return success(JSON.parse(Buffer.concat(chunks).toString("utf8")));
  } catch (cause) {
    return failure("input.not-json", { detail: cause instanceof SyntaxError ? cause.message : undefined });
  }
}
