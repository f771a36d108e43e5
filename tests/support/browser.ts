import type { LaunchOptions } from "@playwright/test";
import { findChromium, isRoot } from "../../scripts/programs.mjs";

// quiet and self-contained: no graphics card, no update checks, no traffic of its own
const flags = [
  "--disable-gpu",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
];

/** How every browser of the tests is started: the system's Chromium, which as root runs only without its sandbox. */
export const launchOptions: LaunchOptions = {
  executablePath: findChromium() ?? undefined,
  args: isRoot() ? [...flags, "--no-sandbox"] : flags,
};
