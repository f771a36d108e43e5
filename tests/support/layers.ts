import { posix } from "node:path";
import ts from "typescript";

/** A source file: its path from the root, with forward slashes, and its text. */
export type SourceFile = { path: string; text: string };
type Rule = { may: string[]; typesOf?: string[]; packages: string[] };

// The table of DEVELOPERS.md. A package ending in * stands for everything that begins so; node: is Node's own.
const layers: Record<string, Rule> = {
  "lib/units": { may: [], packages: [] },
  "lib/engine": { may: ["lib/units"], typesOf: ["lib"], packages: [] },
  "lib/server": {
    may: ["lib", "lib/engine", "lib/units", "db", "db/queries"],
    typesOf: ["db/schema"],
    packages: ["next", "next-auth", "@auth/*", "react", "zod", "@node-rs/argon2", "drizzle-orm", "nodemailer", "node:*"],
  },
  lib: { may: ["lib/units", "lib/engine"], packages: ["zod"] },
  "db/schema": { may: [], typesOf: ["lib", "lib/engine"], packages: ["drizzle-orm"] },
  "db/queries": { may: ["db", "db/schema", "lib"], typesOf: ["lib/engine"], packages: ["drizzle-orm", "postgres"] },
  db: { may: ["db/queries", "db/schema", "lib"], typesOf: ["lib/engine"], packages: ["drizzle-orm", "postgres", "node:*"] },
  // a program, not a library: it makes what the application makes, with the application's own means
  "db/seed.ts": { may: ["db", "db/schema", "db/queries", "lib", "lib/server", "lib/engine", "lib/units"], packages: ["drizzle-orm", "node:*"] },
  workers: { may: ["lib", "lib/engine", "lib/units"], packages: ["comlink"] },
  "components/ui": { may: ["lib/units"], packages: ["react", "react-dom", "radix-ui", "get-nonce"] },
  components: {
    may: ["components/ui", "lib", "lib/engine", "lib/units", "workers"],
    typesOf: ["db/queries"],
    packages: ["react", "react-dom", "next", "zustand", "d3-*", "radix-ui", "swr", "react-hook-form", "@hookform/*", "idb-keyval", "comlink"],
  },
  app: {
    may: ["components", "components/ui", "lib", "lib/engine", "lib/units", "lib/server", "db", "db/queries", "workers"],
    typesOf: ["db/schema"],
    packages: ["next", "next-auth", "react", "zod", "@fontsource-variable/*"],
  },
};
const layerNames = Object.keys(layers).sort((a, b) => b.length - a.length);

// Inside the engine a folder looks only at folders before it; the last four stand side by side.
const engineOrder = [["model"], ["solver"], ["sensing"], ["sizing", "uncertainty", "faults", "fit"]];

// The two lists a reader may import from by the name of the folder.
const barrels = ["lib/engine/index.ts", "db/schema/index.ts"];

const impureNames = ["window", "document", "localStorage", "navigator", "process", "fetch", "performance", "globalThis", "self", "setTimeout", "setInterval"];
const impureMembers: Record<string, string[]> = { Date: ["now"], Math: ["random"] };

// aim / stop of style: what is over the stop is named, not refused
const sizeStops: [pattern: RegExp, lineCount: number][] = [
  [/^app\/.*page\.tsx$/, 120],
  [/^components\/.*\.tsx$/, 200],
  [/^lib\/engine\/.*\.ts$/, 300],
  [/^db\/queries\/.*\.ts$/, 250],
  [/^db\/schema\/.*\.ts$/, 150],
  [/^app\/.*actions\.ts$/, 250],
  [/^tests\/.*\.test\.tsx?$/, 400],
];

export const layerOf = (path: string) => layerNames.find((name) => path === name || path.startsWith(`${name}/`));

type Import = { target: string; line: number; isTypeOnly: boolean };

/** Every import, re-export and dynamic import of a file. An import of types alone is marked so. */
function importsOf(source: ts.SourceFile): Import[] {
  const found: Import[] = [];
  const add = (node: ts.Expression | undefined, isTypeOnly: boolean) => {
    if (!node || !ts.isStringLiteral(node)) return;
    found.push({ target: node.text, isTypeOnly, line: source.getLineAndCharacterOfPosition(node.getStart(source)).line + 1 });
  };
  const visit = (node: ts.Node): void => {
    if (ts.isImportDeclaration(node)) {
      const clause = node.importClause;
      const named = clause?.namedBindings;
      const allNamedAreTypes =
        clause !== undefined && !clause.name && named !== undefined && ts.isNamedImports(named) && named.elements.length > 0 && named.elements.every((element) => element.isTypeOnly);
      add(node.moduleSpecifier, clause?.phaseModifier === ts.SyntaxKind.TypeKeyword || allNamedAreTypes);
    } else if (ts.isExportDeclaration(node)) {
      add(node.moduleSpecifier, node.isTypeOnly);
    } else if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword) {
      add(node.arguments[0], false);
    } else if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) {
      add(node.argument.literal as ts.Expression, true);
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  return found;
}

const isAllowedPackage = (name: string, allowed: string[]) =>
  allowed.some((entry) => (entry.endsWith("*") ? name.startsWith(entry.slice(0, -1)) : name === entry));

function packageOf(target: string): string {
  if (target.startsWith("node:")) return target;
  return target.split("/").slice(0, target.startsWith("@") ? 2 : 1).join("/");
}

function faultOfEngineOrder(path: string, target: string): string | null {
  const rank = (file: string) => engineOrder.findIndex((group) => group.includes(file.split("/")[2] ?? ""));
  const [from, to] = [path.split("/")[2], target.split("/")[2]];
  if (rank(path) < 0 || from === to) return null;
  // a file of the root of the engine (the shared data types) has no rank: all may look at it, except at the public list
  if (rank(target) < 0) return target === "lib/engine/index" || target === "lib/engine" ? `engine/${from} must not look up at the public list` : null;
  return rank(target) >= rank(path) ? `engine/${from} must not look up or across at engine/${to}` : null;
}

function faultOfImport(path: string, from: string, { target, isTypeOnly }: Import): string | null {
  const rule = layers[from]!;
  const isInside = target.startsWith("@/") || target.startsWith(".");
  if (!isInside) {
    const name = packageOf(target);
    return isAllowedPackage(name, rule.packages) ? null : `${from} must not import package ${name}`;
  }
  const file = target.startsWith("@/") ? target.slice(2) : posix.normalize(posix.join(posix.dirname(path), target));
  const to = layerOf(file);
  if (/^(app|tests)(\/|$)/.test(file) && from !== "app") return `${from} must not import ${file.split("/")[0]}`;
  if (file.startsWith("tests/")) return `${from} must not import tests`;
  if (from === "lib/engine" && to === from && !isTypeOnly) return faultOfEngineOrder(path, file);
  if (!to || to === from || rule.may.includes(to)) return null;
  if (rule.typesOf?.includes(to)) return isTypeOnly ? null : `${from} must import only types of ${to}`;
  return `${from} must not import ${to}`;
}

/** Names of the browser, of Node, of the clock and of chance that a file uses as globals; a parameter of that name is none. */
function impuritiesOf({ path, text }: SourceFile): { line: number; name: string }[] {
  const source = ts.createSourceFile(path, text, ts.ScriptTarget.ES2022, true);
  const host: ts.CompilerHost = {
    getSourceFile: (name) => (name === path ? source : undefined),
    getDefaultLibFileName: () => "",
    writeFile: () => {},
    getCurrentDirectory: () => "",
    getCanonicalFileName: (name) => name,
    useCaseSensitiveFileNames: () => true,
    getNewLine: () => "\n",
    fileExists: (name) => name === path,
    readFile: () => undefined,
  };
  // without any library a global has no declaration, so what resolves is the file's own
  const checker = ts.createProgram([path], { noLib: true, noResolve: true, target: ts.ScriptTarget.ES2022 }, host).getTypeChecker();
  const found: { line: number; name: string }[] = [];
  const isGlobal = (node: ts.Identifier) => !checker.getSymbolAtLocation(node)?.declarations?.length;
  const visit = (node: ts.Node): void => {
    if (ts.isIdentifier(node) && isGlobal(node)) {
      const { parent } = node;
      const isMember = (ts.isPropertyAccessExpression(parent) && parent.name === node) || (ts.isQualifiedName(parent) && parent.right === node);
      const member = ts.isPropertyAccessExpression(parent) && parent.expression === node ? parent.name.text : "";
      const line = source.getLineAndCharacterOfPosition(node.getStart()).line + 1;
      if (!isMember && impureNames.includes(node.text)) found.push({ line, name: node.text });
      if (!isMember && impureMembers[node.text]?.includes(member)) found.push({ line, name: `${node.text}.${member}` });
      if (node.text === "Date" && ts.isNewExpression(parent) && (parent.arguments?.length ?? 0) === 0) found.push({ line, name: "new Date()" });
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  return found;
}

/** Everything in these files that crosses a forbidden line, as "path:line what". */
export function findLayerFaults(files: SourceFile[]): string[] {
  return files.flatMap((file) => {
    const { path, text } = file;
    const faults: string[] = [];
    if (/(^|\/)index\.tsx?$/.test(path) && !barrels.includes(path)) faults.push(`${path}:1 no index file here: import the file that holds the thing`);
    const from = layerOf(path);
    if (!from) return faults;
    for (const entry of importsOf(ts.createSourceFile(path, text, ts.ScriptTarget.ES2022, true, path.endsWith("x") ? ts.ScriptKind.TSX : ts.ScriptKind.TS))) {
      const fault = faultOfImport(path, from, entry);
      if (fault) faults.push(`${path}:${entry.line} ${fault}`);
    }
    if (from === "lib/engine" || from === "lib/units") for (const { line, name } of impuritiesOf(file)) faults.push(`${path}:${line} ${from} must stay pure: ${name}`);
    return faults;
  });
}

/** Files longer than the stop of their kind. Data tables are exempt and carry "table" or "catalogue" in their name. */
export function findLongFiles(files: SourceFile[]): string[] {
  return files.flatMap(({ path, text }) => {
    const stop = sizeStops.find(([pattern]) => pattern.test(path))?.[1];
    const lineCount = text.split("\n").length - 1;
    return stop !== undefined && lineCount > stop && !/table|catalogue/.test(path) ? [`${path}: ${lineCount} lines, stop is ${stop}`] : [];
  });
}
