import { describe, expect, it } from "vitest";
import { ACCESS, can, DEEDS, MEMBER_ROLES, ROLES, type Deed, type Role } from "@/lib/access/table";
import { memberRole } from "@/db/schema/index";

describe("the permission table", () => {
  it("gives a guest nothing but opening a link", () => {
    expect(DEEDS.filter((deed) => can("guest", deed, { isOwn: true, hasApproved: true }))).toEqual(["link.open"]);
  });

  it("gives an admin all that a lead may, and a lead all that a designer may", () => {
    const rank = { none: 0, own: 1, approved: 2, all: 3 };
    for (const deed of DEEDS) {
      const { admin, lead, designer } = ACCESS[deed];
      expect(rank[admin], deed).toBeGreaterThanOrEqual(rank[lead]);
      expect(rank[lead], deed).toBeGreaterThanOrEqual(rank[designer]);
    }
  });

  it("hides drafts of others from a student, and nothing of one's own", () => {
    expect(can("student", "scenario.read", { isOwn: false, hasApproved: false })).toBe(false);
    expect(can("student", "scenario.read", { isOwn: false, hasApproved: true })).toBe(true);
    expect(can("student", "scenario.read", { isOwn: true, hasApproved: false })).toBe(true);
  });

  it("lets trainer and student save their own copies only", () => {
    for (const role of ["trainer", "student"] as const) {
      expect(can(role, "revision.save", { isOwn: true })).toBe(true);
      expect(can(role, "revision.save", { isOwn: false, hasApproved: true })).toBe(false);
    }
  });

  it("shows a kept draft to its author only, whatever the role", () => {
    for (const role of MEMBER_ROLES) {
      expect(can(role, "draft.read", { isOwn: true })).toBe(true);
      expect(can(role, "draft.read", { isOwn: false })).toBe(false);
    }
  });

  it("counts a thing as not the actor's own unless it is said to be", () => {
    const ownOnly: [Role, Deed][] = ROLES.flatMap((role) =>
      DEEDS.filter((deed) => ACCESS[deed][role] === "own").map((deed): [Role, Deed] => [role, deed]),
    );
    expect(ownOnly.length).toBeGreaterThan(0);
    for (const [role, deed] of ownOnly) expect(can(role, deed), `${role} ${deed}`).toBe(false);
  });

  it("names the same roles as the database, which has no guest", () => {
    expect(memberRole.enumValues).toEqual([...MEMBER_ROLES]);
  });
});
