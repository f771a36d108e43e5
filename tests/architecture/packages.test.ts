import { readFileSync } from "node:fs";
import { resolve } from "node:path";
import { describe, expect, it } from "vitest";

const root = resolve(import.meta.dirname, "../..");
const read = (name: string) => readFileSync(resolve(root, name), "utf8");
const manifest = JSON.parse(read("package.json")) as Record<"dependencies" | "devDependencies" | "scripts", Record<string, string>>;

describe("packages", () => {
  it("every version is exact, so that two machines get the same", () => {
    const loose = Object.entries({ ...manifest.dependencies, ...manifest.devDependencies }).filter(([, version]) => !/^\d+\.\d+\.\d+(-[\w.]+)?$/.test(version));
    expect(loose).toEqual([]);
  });

  it("the lock names no registry, so that it serves behind any mirror", () => {
    expect(read("package-lock.json")).not.toContain('"resolved"');
    expect(read(".npmrc")).toContain("omit-lockfile-registry-resolved=true");
  });

  it("scripts that start a program do it in place of the shell, so that a signal reaches it", () => {
    for (const name of ["prestart", "start", "pretest", "test", "bench", "calc", "db:migrate", "db:seed"]) {
      expect(manifest.scripts[name], name).toMatch(/^exec node /);
    }
  });
});
