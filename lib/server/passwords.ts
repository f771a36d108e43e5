import { hash, verify } from "@node-rs/argon2";

// OWASP Password Storage Cheat Sheet, argon2id: 19 MiB, two passes, one lane. About 54 ms here (design/platform.md).
// The package's default algorithm is argon2id; its enum is a const enum and cannot be imported with isolatedModules.
const COST = { memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;

export const hashPassword = (password: string): Promise<string> => hash(password, COST);
export const verifyPassword = (passwordHash: string, password: string): Promise<boolean> =>
  verify(passwordHash, password);
export type VerifyPassword = typeof verifyPassword;

let dummy: Promise<string> | undefined;
/** A hash that no password has, for e-mails that nobody has: looking for one then costs as much as looking at a real one. */
export const dummyPasswordHash = (): Promise<string> => (dummy ??= hashPassword(crypto.randomUUID()));
