/** One line of JSON per fact, on standard error, with the request's correlation id. Never a password, token or document. */
export function logFault(what: string, facts: Record<string, unknown>, cause?: unknown): void {
  const told =
    cause instanceof Error
      ? {
          name: cause.name,
          message: cause.message,
          stack: cause.stack,
          cause: cause.cause instanceof Error ? cause.cause.message : undefined,
        }
      : cause;
  console.error(JSON.stringify({ level: "error", what, ...facts, cause: told }));
}
