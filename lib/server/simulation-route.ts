import type { RootDatabase, Scope } from "@/db/client";
import { can } from "@/lib/access/table";
import type { Result } from "@/lib/result";
import { readJsonBody } from "./json-body";
import { takeAttempt } from "./limits";
import { logFault } from "./log";
import { problem } from "./problem";
import { readSimulationRequest, runSimulation, SIMULATION_LIMITS } from "./simulate";

/** POST /api/v1/simulations for the person of `scope` (null: not signed in). */
export async function answerSimulation(db: RootDatabase, scope: Scope | null, request: Request): Promise<Response> {
  if (!scope) return problem("auth.required");
  if (!can(scope.role, "simulation.run")) return problem("access.denied");
  const attempt = await takeAttempt(db, "simulation.run", scope.userId);
  if (!attempt.ok) return refusal(attempt);
  const body = await readJsonBody(request, SIMULATION_LIMITS.bodyBytes);
  if (!body.ok) return refusal(body);
  const asked = readSimulationRequest(body.value);
  if (!asked.ok) return refusal(asked);
  try {
    const result = await runSimulation(asked.value, request.signal);
    if (!result.ok) return refusal(result);
    return Response.json(result.value, { headers: { "cache-control": "no-store" } });
  } catch (cause) {
    logFault("simulation", { correlationId: scope.correlationId }, cause);
    return problem("engine.failed", { detail: `Reference ${scope.correlationId}` });
  }
}

function refusal(result: Extract<Result<unknown>, { ok: false }>): Response {
  const { code, findings, detail } = result;
  const waitS =
    typeof detail === "object" && detail !== null && "retryAfterS" in detail ? String(detail.retryAfterS) : undefined;
  return problem(code, {
    findings,
    detail: typeof detail === "string" ? detail : undefined,
    headers: waitS === undefined ? undefined : { "retry-after": waitS },
  });
}
