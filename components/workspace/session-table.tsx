import type { OwnSession } from "./session-view";
import { browserWords } from "./browser-words";
import { EndSession } from "./end-session";
import { Moment } from "./moment";
import type { ComponentProps } from "react";

type Actions = Pick<ComponentProps<typeof EndSession>, "revokeSession" | "signOut">;

/** Where the person is signed in, latest use first. */
export function SessionTable({ sessions, actions }: { sessions: OwnSession[]; actions: Actions }) {
  return (
    <table className="almanac stacked">
      <thead>
        <tr>
          <th>Browser</th>
          <th>Address</th>
          <th>Since</th>
          <th>Last seen</th>
          <th>
            <span className="visually-hidden">End it</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {sessions.map((session) => (
          <tr key={session.id}>
            <td title={session.userAgent}>
              {browserWords(session.userAgent)} {session.isCurrent && <span className="tag">this session</span>}
            </td>
            <td data-head="Address">{session.address || "unknown"}</td>
            <td data-head="Since">
              <Moment at={session.createdAt} />
            </td>
            <td data-head="Last seen">
              <Moment at={session.lastSeenAt} />
            </td>
            <td className="num">
              <EndSession sessionId={session.id} isCurrent={session.isCurrent} {...actions} />
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
