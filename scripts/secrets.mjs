// Passwords and keys of this installation: made once, kept in the data folder, readable by its owner only.
import { randomBytes } from "node:crypto";
import { readFileSync, renameSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { Refusal } from "./messages.mjs";
import { dataFolder } from "./paths.mjs";

const makeSecret = () => randomBytes(24).toString("base64url");

/** { ownerPassword, applicationPassword, authSecret }; what is missing is made and written before it is used. */
export function openSecrets() {
  const file = join(dataFolder, "secrets.json");
  let known = {};
  try {
    known = JSON.parse(readFileSync(file, "utf8"));
  } catch (error) {
    if (error.code !== "ENOENT") throw new Refusal(`${file} cannot be read (${error.message}). It holds the passwords of the database beside it: restore it, or move the whole folder away to begin anew.`);
  }
  const secrets = { ownerPassword: makeSecret(), applicationPassword: makeSecret(), authSecret: makeSecret(), ...known };
  if (Object.keys(secrets).length > Object.keys(known).length) {
    writeFileSync(`${file}.new`, JSON.stringify(secrets, null, 2), { mode: 0o600 });
    renameSync(`${file}.new`, file);
  }
  return secrets;
}
