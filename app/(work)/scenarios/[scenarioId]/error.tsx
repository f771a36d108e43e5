"use client";

import { ScenarioBroken } from "@/components/scenario/scenario-broken";

/** The scenario could not be shown; what was not saved is still in this browser. */
export default function ScenarioError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return <ScenarioBroken digest={error.digest} onRetry={reset} />;
}
