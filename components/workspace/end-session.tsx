"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { reach } from "@/components/scenario/saving";
import { errorText } from "@/lib/errors";
import type { Result } from "@/lib/result";

type Props = {
  sessionId: string;
  isCurrent: boolean;
  revokeSession: (input: { sessionId: string }) => Promise<Result<null>>;
  signOut: () => Promise<Result<null>>;
};

/** Ends one session; ending the own one is signing out. */
export function EndSession({ sessionId, isCurrent, revokeSession, signOut }: Props) {
  const router = useRouter();
  const [problem, setProblem] = useState<string>();
  const [isBusy, setBusy] = useState(false);
  async function end() {
    setBusy(true);
    setProblem(undefined);
    const result = await reach(() => (isCurrent ? signOut() : revokeSession({ sessionId })));
    setBusy(false);
    if (!result.ok) return setProblem(errorText(result.code));
    if (isCurrent) router.push("/sign-in");
    router.refresh();
  }
  return (
    <>
      <Button disabled={isBusy} onClick={() => void end()}>
        {isCurrent ? "Sign out" : "Revoke"}
      </Button>
      {problem && (
        <p role="alert" className="mt-1 font-medium text-fault">
          {problem}
        </p>
      )}
    </>
  );
}
