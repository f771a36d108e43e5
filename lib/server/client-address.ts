import { subscribe } from "node:diagnostics_channel";
import type { IncomingMessage } from "node:http";

let isPinned = false;

/**
 * Makes the last entry of X-Forwarded-For the address of the connection itself, for every request, before anything reads
 * it. Without this the header is whatever the visitor sent, and a limit per address could be walked around by inventing one.
 * Called once when the server starts (instrumentation.ts).
 */
export function pinClientAddress(): void {
  if (isPinned) return;
  isPinned = true;
  subscribe("http.server.request.start", (message) => {
    const { request } = message as { request: IncomingMessage };
    const before = request.headers["x-forwarded-for"];
    const address = request.socket.remoteAddress ?? "unknown";
    request.headers["x-forwarded-for"] = before ? `${String(before)}, ${address}` : address;
  });
}
