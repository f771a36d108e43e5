import type { ShareLinkView } from "@/db/queries/shares";
import type { Result } from "@/lib/result";

/** The server actions of sharing, handed down by the page. */
export type ShareActions = {
  createShareLink: (input: { scenarioId: string; label: string; follows: "pinned" | "newest"; revisionNumber?: number; expiresAt?: Date | null }) => Promise<Result<{ id: string; url: string }>>;
  listShareLinks: (input: { scenarioId: string }) => Promise<Result<ShareLinkView[]>>;
  revokeShareLink: (input: { linkId: string }) => Promise<Result<null>>;
  changeExpiry: (input: { linkId: string; expiresAt: Date | null }) => Promise<Result<{ expiresAt: Date | null }>>;
};
