import { gateDrive } from "./template-parts";
import type { ScenarioDocument } from "./schema";

/** The document that a new scenario starts with when no template is chosen: the gate drive, running forward. */
export const defaultDocument = (): ScenarioDocument => ({ ...gateDrive(), title: "New scenario" });
