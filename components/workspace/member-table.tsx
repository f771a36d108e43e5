import type { MemberView } from "@/db/queries/people";
import { ROLE_WORDS } from "@/lib/access/table";

/** The members the person may see, with what each is here for. */
export function MemberTable({ members, userId }: { members: MemberView[]; userId: string }) {
  return (
    <table className="almanac stacked">
      <thead>
        <tr>
          <th>Name</th>
          <th>E-mail</th>
          <th>Role</th>
          <th>What the role is for</th>
        </tr>
      </thead>
      <tbody>
        {members.map((member) => (
          <tr key={member.userId}>
            <td className="font-semibold">
              {member.name} {member.userId === userId && <span className="tag">you</span>}
            </td>
            <td>{member.email}</td>
            <td>{ROLE_WORDS[member.role].name}</td>
            <td className="text-ink2">{ROLE_WORDS[member.role].does}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
