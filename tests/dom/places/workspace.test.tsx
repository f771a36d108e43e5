import { render, screen, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { browserWords } from "@/components/workspace/browser-words";
import { doneWords } from "@/components/workspace/deed-words";
import { AuditTable } from "@/components/workspace/audit-table";
import { RoleTable } from "@/components/workspace/role-table";

describe("the words of the workspace and account pages", () => {
  // invented programs on the three shapes of user agents in use
  it.each([
    ["Root/5.0 (X11; Linux x86_64; rv:88.0) Enga/20230101 Brigga/88.0", "Brigga 88, Linux, on a computer"],
    ["Root/5.0 (X11; Linux x86_64) Kitt/511.6 (like Enga) Sloopa/93.0.1 Yawla/511.6", "Sloopa 93, Linux, on a computer"],
    ["Root/5.0 (Plane NT 10.0; x64) Kitt/511.6 (like Enga) Sloopa/93.0 Yawla/511.6 Ketcha/94.2", "Ketcha 94, Plane, on a computer"],
    ["Root/5.0 (Slab; Slab OS 16_1) Kitt/604.1 (like Enga) Version/16.1 Mobile/15E Yawla/604.1", "Yawla 16, Slab, on a phone"],
    ["fetcher/8.1", "fetcher 8"],
    ["", "Unknown program"],
  ])("reads %s", (userAgent, words) => expect(browserWords(userAgent)).toBe(words));

  it("says which deed of the audit was refused", () => {
    expect(doneWords("revision.save", { number: 6 })).toBe("Saved revision 6");
    expect(doneWords("revision.save", { baseNumber: 5, refused: "edit.conflict" })).toBe("Saved revision: refused");
  });

  it("shows what the access table gives each role, with the person's own role marked", () => {
    render(<RoleTable ownRole="trainer" />);
    expect(screen.getByRole("columnheader", { name: /^Trainer/ })).toHaveTextContent("your role");
    const row = screen.getByRole("rowheader", { name: "Revoke share links" }).closest("tr")!;
    expect(within(row).getAllByRole("cell").map((cell) => cell.textContent)).toEqual(["all", "all", "all", "own", "no–", "no–"]);
  });

  it("names the scenario and the link of an audit row, and leads there", () => {
    const at = new Date(Date.UTC(2026, 2, 5, 7, 8));
    const row = { id: 12, actorName: "Runa Tamsel", deed: "share.make", thingId: "9", detail: { scenarioId: "s4", label: "Class", follows: "pinned", revisionNumber: 3 }, correlationId: "c", createdAt: at };
    render(<AuditTable rows={[row]} titles={new Map([["s4", "Sluice gate"]])} />);
    expect(screen.getByRole("link", { name: "Sluice gate" })).toHaveAttribute("href", "/scenarios/s4");
    const cells = screen.getAllByRole("cell").map((cell) => cell.textContent);
    expect(cells).toEqual(["5 Mar 2026, 07:08 UTC", "Runa Tamsel", "Made a link to revision 3", "“Class” of Sluice gate"]);
  });
});
