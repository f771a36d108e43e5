/** Hands a file to the browser. */
export function download(name: string, content: string | Blob, type: string): void {
  const url = URL.createObjectURL(typeof content === "string" ? new Blob([content], { type }) : content);
  const anchor = document.createElement("a");
  anchor.href = url;
  anchor.download = name;
  anchor.click();
  // the browser has read the address by the next task
  setTimeout(() => URL.revokeObjectURL(url), 1000);
}

/** A title as a file name: letters and digits of any script, the rest as hyphens. */
export const fileNameOf = (title: string, extension: string): string =>
  `${
    title
      .toLowerCase()
      .replace(/[^\p{L}\p{N}]+/gu, "-")
      .replace(/^-+|-+$/g, "")
      .slice(0, 60) || "scenario"
  }.${extension}`;
