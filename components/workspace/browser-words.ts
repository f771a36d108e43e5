const ENGINE_WORD = /^(?:Version|Mobile)$/;

/**
 * A user agent in plain words: the program, what it runs on, phone or not. No list of names: the program is the last one that names
 * itself with a version of its own, since a browser repeats the version of its engine behind every name it only claims to be like.
 */
export function browserWords(userAgent: string): string {
  const brackets = /\(([^)]*)\)/.exec(userAgent)?.[1] ?? "";
  const tokens = [...userAgent.replace(/\([^)]*\)/g, " ").matchAll(/([^\s/]+)\/(\S+)/g)].map(([, name = "", version = ""]) => ({ name, version }));
  const claimed = tokens.slice(brackets ? 1 : 0).filter((one) => !ENGINE_WORD.test(one.name));
  const own = claimed.filter((one, index) => index > 0 && !claimed.slice(0, index).some((earlier) => earlier.version === one.version));
  const program = own.at(-1) ?? claimed.at(-1);
  if (!program) return "Unknown program";
  const version = tokens.find((one) => one.name === "Version")?.version ?? program.version;
  const system = brackets
    .split(";")
    .map((part) => part.trim())
    .find((part) => part !== "" && !/^[UX]\d*$/.test(part))
    ?.replace(/\s+(?:NT\s+)?[\d._]+$|\s+\S*\d\S*$/, "");
  const place = /Mobi/.test(userAgent) ? "on a phone" : brackets ? "on a computer" : "";
  return [`${program.name} ${version.split(".")[0]}`, system, place].filter(Boolean).join(", ");
}
