import type { Metadata } from "next";
import { AuditTable } from "@/components/workspace/audit-table";
import { MemberTable } from "@/components/workspace/member-table";
import { RoleTable } from "@/components/workspace/role-table";
import { db, type Scope } from "@/db/client";
import { findScenarios } from "@/db/queries/scenarios";
import { can, ROLE_WORDS } from "@/lib/access/table";
import { errorText, type ErrorCode } from "@/lib/errors";
import { requireScope } from "@/lib/server/actor";
import { listAudit, listMembers } from "@/lib/server/deeds/workspace";

export const metadata: Metadata = { title: "Workspace" };

/** Titles for the scenarios the audit names: the hundred last changed, kept and archived; others show their short key. */
async function loadTitles(scope: Scope): Promise<Map<string, string>> {
  const lists = await Promise.all([false, true].map((archived) => findScenarios(db, scope, { archived, page: 1, pageSize: 100 })));
  return new Map(lists.flatMap((list) => list.rows.map((row) => [row.id, row.title] as const)));
}

/** Who works here, what each role may do, and for admins what was done. */
export default async function WorkspacePage() {
  const scope = await requireScope();
  const mayAudit = can(scope.role, "audit.read");
  const [members, audit, titles] = await Promise.all([
    listMembers(db, scope, {}),
    mayAudit ? listAudit(db, scope, {}) : null,
    mayAudit ? loadTitles(scope) : new Map<string, string>(),
  ]);
  return (
    <div className="px-8 py-6 max-[719px]:px-4">
      <h1>{scope.workspaceName}</h1>
      <p className="mt-1 text-ink2">
        You are here as {ROLE_WORDS[scope.role].name.toLowerCase()}. {ROLE_WORDS[scope.role].does}
      </p>
      <h2 className="mt-8 mb-3">Members</h2>
      {members.ok ? <MemberTable members={members.value} userId={scope.userId} /> : <Refused code={members.code} />}
      {!can(scope.role, "members.read") && <p className="mt-2 text-ink2">With your role you see yourself only.</p>}
      <h2 className="mt-10 mb-1">What each role may do</h2>
      <p className="mb-3 text-ink2">“own” is what the person made or owns; “own and approved” adds scenarios with an approved revision.</p>
      <RoleTable ownRole={scope.role} />
      <h2 className="mt-10 mb-3">Audit</h2>
      {audit === null ? (
        <p className="text-ink2">Only admins read the audit: it names who did what. Ask an admin of this workspace if you need to know.</p>
      ) : !audit.ok ? (
        <Refused code={audit.code} />
      ) : audit.value.length === 0 ? (
        <p className="text-ink2">Nothing has been done here yet.</p>
      ) : (
        <AuditTable rows={audit.value} titles={titles} />
      )}
    </div>
  );
}

function Refused({ code }: { code: ErrorCode }) {
  return (
    <p role="alert" className="font-medium text-fault">
      {errorText(code)}
    </p>
  );
}
