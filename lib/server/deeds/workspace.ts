import { z } from "zod";
import { findAuditRows } from "@/db/queries/audit";
import { findMembers } from "@/db/queries/people";
import { success } from "@/lib/result";
import { defineDeed } from "../deed";

const nothing = z.object({});

export const listMembers = defineDeed({
  deed: "members.read",
  input: nothing,
  // a student reads the one row that is his own; the policy on memberships leaves no other
  thing: async () => ({ isOwn: true }),
  run: async ({ tx, scope }) => success(await findMembers(tx, scope)),
});

export const listAudit = defineDeed({
  deed: "audit.read",
  input: nothing,
  run: async ({ tx, scope }) => success(await findAuditRows(tx, scope)),
});
