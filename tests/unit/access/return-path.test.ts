import { describe, expect, it } from "vitest";
import { safeReturnPath } from "@/lib/access/return-path";

describe("the way back after signing in", () => {
  it.each(["/scenarios", "/scenarios/3f2a?at=0.001&lane=motor", "/workspace#audit"])("keeps %s", (path) => {
    expect(safeReturnPath(path)).toBe(path);
  });

  it.each([
    "https://elsewhere.example/x",
    "//elsewhere.example/x",
    "/\\elsewhere.example",
    "\\\\elsewhere.example",
    "/x/..//elsewhere.example",
    "/%0d%0a\r\nlocation: x",
    "javascript:alert(1)",
    "scenarios",
    "/sign-in?from=/sign-in",
    "/api/auth/signout",
    `/${"a".repeat(600)}`,
    "",
    undefined,
    ["/scenarios"],
  ])("replaces %j by the scenario table", (value) => {
    expect(safeReturnPath(value, "/home")).toBe("/home");
  });
});
