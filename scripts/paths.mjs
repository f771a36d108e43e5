// Where things are. Everything a run makes stands in one folder outside git.
import { mkdirSync } from "node:fs";
import { join, resolve } from "node:path";

export const root = resolve(import.meta.dirname, "..");
export const dataFolder = resolve(process.env.SLACKWATER_DATA_DIR ?? join(root, ".data"));
export const logFolder = join(dataFolder, "logs");

/** Makes the data folder: others may pass through it (the user that runs PostgreSQL must), but not list it. */
export function makeDataFolder() {
  mkdirSync(dataFolder, { recursive: true, mode: 0o711 });
  mkdirSync(logFolder, { recursive: true, mode: 0o700 });
}

/** The Node options with which a child ends itself when this process is gone. */
export const watchedNode = ["--import", join(import.meta.dirname, "parent-watch.mjs")];
export const nextProgram = join(root, "node_modules/next/dist/bin/next");
