import { z } from "zod";
import { requireScenarioThing } from "@/db/queries/scenario-access";
import {
  changeLinkExpiry,
  createShareLink as insertShareLink,
  findShareLinks,
  requireLinkThing,
  revokeLink,
} from "@/db/queries/shares";
import { failure, success } from "@/lib/result";
import { defineDeed } from "../deed";
import { applicationUrl } from "../env";
import { keyField } from "../findings";
import { createToken, hashToken } from "../tokens";

const LABEL_RULE = "A label has 1 to 80 characters.";
const labelField = z.string().trim().min(1, { error: LABEL_RULE }).max(80, { error: LABEL_RULE });
// a Date from a server action, or ISO text from a form or a program
const expiryField = z
  .union([z.date(), z.iso.datetime({ offset: true }).transform((text) => new Date(text))], {
    error: "Give the expiry as a date and time.",
  })
  .refine((date) => date.getTime() > Date.now(), { error: "The expiry must lie in the future." })
  .nullable();

/** Makes a link. Its URL is in this answer and nowhere else: only a hash of the token is kept. */
export const createShareLink = defineDeed({
  deed: "share.make",
  input: z
    .object({
      scenarioId: keyField,
      label: labelField,
      follows: z.enum(["pinned", "newest"]),
      revisionNumber: z.int().min(1).optional(),
      expiresAt: expiryField.optional(),
    })
    .refine((input) => input.follows === "newest" || input.revisionNumber !== undefined, {
      path: ["revisionNumber"],
      error: "Say which revision the link is pinned to.",
    }),
  thing: (tx, scope, input) => requireScenarioThing(tx, scope, input.scenarioId),
  run: async ({ tx, scope, input, thing }) => {
    const revisionNumber = input.follows === "pinned" ? (input.revisionNumber ?? null) : null;
    if (revisionNumber !== null && revisionNumber > thing.newestNumber) {
      return failure("input.invalid", {
        findings: [
          { path: "revisionNumber", code: "input.invalid", text: `There are revisions 1 to ${thing.newestNumber}.` },
        ],
      });
    }
    const token = createToken();
    const id = await insertShareLink(tx, scope, {
      scenarioId: input.scenarioId,
      tokenHash: hashToken(token),
      label: input.label,
      revisionNumber,
      expiresAt: input.expiresAt ?? null,
    });
    return success({ id, url: `${applicationUrl()}/s/${token}` });
  },
  audit: ({ input, result }) => ({
    thingId: result.ok ? result.value.id : undefined,
    detail: {
      scenarioId: input.scenarioId,
      label: input.label,
      follows: input.follows,
      revisionNumber: input.revisionNumber,
    },
  }),
});

export const listShareLinks = defineDeed({
  deed: "share.list",
  input: z.object({ scenarioId: keyField }),
  thing: (tx, scope, input) => requireScenarioThing(tx, scope, input.scenarioId),
  run: async ({ tx, scope, input }) => success(await findShareLinks(tx, scope, input.scenarioId)),
});

/** Withdraws a link for good. Withdrawing it twice is no mistake. */
export const revokeShareLink = defineDeed({
  deed: "share.revoke",
  input: z.object({ linkId: keyField }),
  thing: (tx, scope, input) => requireLinkThing(tx, scope, input.linkId),
  run: async ({ tx, scope, input }) => {
    await revokeLink(tx, scope, input.linkId);
    return success(null);
  },
  audit: ({ input }) => ({ thingId: input.linkId }),
});

/** Sets when a link ends; null lets it run on. A withdrawn link stays withdrawn. */
export const changeExpiry = defineDeed({
  deed: "share.change",
  input: z.object({ linkId: keyField, expiresAt: expiryField }),
  thing: (tx, scope, input) => requireLinkThing(tx, scope, input.linkId),
  run: async ({ tx, scope, input, thing }) => {
    if (thing.isRevoked) return failure("link.revoked");
    await changeLinkExpiry(tx, scope, input.linkId, input.expiresAt);
    return success({ expiresAt: input.expiresAt });
  },
  audit: ({ input }) => ({ thingId: input.linkId, detail: { expiresAt: input.expiresAt?.toISOString() ?? null } }),
});
