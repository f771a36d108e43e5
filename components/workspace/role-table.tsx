import { ACCESS, DEEDS, ROLES, ROLE_WORDS, type Role } from "@/lib/access/table";
import { DEED_WORDS, REACH_WORDS } from "./deed-words";

/** What each role may do, drawn from the very table that decides; the person's own role is marked. */
export function RoleTable({ ownRole }: { ownRole: Role }) {
  const mark = (role: Role) => (role === ownRole ? "bg-sheet font-semibold" : "");
  return (
    <div className="overflow-x-auto" role="region" aria-label="What each role may do" tabIndex={0}>
      <table className="almanac">
        <thead>
          <tr>
            <th>Deed</th>
            {ROLES.map((role) => (
              <th key={role} className={mark(role)}>
                {ROLE_WORDS[role].name}
                {role === ownRole && <span className="visually-hidden">, your role</span>}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {DEEDS.map((deed) => (
            <tr key={deed}>
              <th scope="row" className="row-head">
                {DEED_WORDS[deed]}
              </th>
              {ROLES.map((role) => (
                <td key={role} className={mark(role)}>
                  {ACCESS[deed][role] === "none" && <span className="visually-hidden">no</span>}
                  <span aria-hidden={ACCESS[deed][role] === "none"}>{REACH_WORDS[ACCESS[deed][role]]}</span>
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
