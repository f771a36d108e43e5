import type { SessionView } from "@/db/queries/people";

export type OwnSession = SessionView & { isCurrent: boolean };
