import type { Metadata } from "next";
import { SessionTable } from "@/components/workspace/session-table";
import { errorText } from "@/lib/errors";
import { getPerson, requireScope } from "@/lib/server/actor";
import { listSessions, revokeSession, signOut } from "../actions";

export const metadata: Metadata = { title: "Account" };

const actions = { revokeSession, signOut };

/** The person, and where they are signed in. */
export default async function AccountPage() {
  await requireScope();
  const [person, sessions] = await Promise.all([getPerson(), listSessions()]);
  return (
    <div className="px-8 py-6 max-[719px]:px-4">
      <h1>Account</h1>
      <dl className="mt-4 grid max-w-xl grid-cols-[110px_1fr] gap-y-1">
        <dt className="text-ink2">Name</dt>
        <dd>{person?.userName}</dd>
        <dt className="text-ink2">E-mail</dt>
        <dd>{person?.userEmail}</dd>
      </dl>
      <h2 className="mt-8">Sessions</h2>
      <p className="mt-1 mb-3 text-ink2">Each place where you are signed in. A revoked session ends with its next request.</p>
      {sessions.ok ? <SessionTable sessions={sessions.value} actions={actions} /> : <p role="alert" className="font-medium text-fault">{errorText(sessions.code)}</p>}
    </div>
  );
}
