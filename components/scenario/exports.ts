import { plotToSvg, svgToPng } from "@/components/plot/export";
import type { ThemeName } from "@/components/plot/theme";
import { figuresToText, viewToCsv } from "@/lib/scenario/csv";
import { download, fileNameOf } from "./downloads";
import type { ScenarioStore } from "./store";

/** What leaves the page. Each takes the run as it is shown; the document export takes the draft. */

const PICTURE = { width: 1200, height: 760 };
const PNG_SCALE = 2;

export function exportDocument(store: ScenarioStore): void {
  const { title, document } = store.getState();
  download(fileNameOf(title, "json"), `${JSON.stringify(document, null, 2)}\n`, "application/json");
}

export function exportCsv(store: ScenarioStore): void {
  const { title, shown } = store.getState();
  if (shown) download(fileNameOf(title, "csv"), viewToCsv(shown.view, shown.document), "text/csv;charset=utf-8");
}

function pictureOf(store: ScenarioStore, theme: ThemeName): string | null {
  const { title, shown, viewWindow } = store.getState();
  return (
    shown &&
    plotToSvg(shown.view, shown.document, PICTURE, theme, { window: viewWindow, overview: shown.overview, title })
  );
}

export function exportSvg(store: ScenarioStore, theme: ThemeName): void {
  const svg = pictureOf(store, theme);
  if (svg) download(fileNameOf(store.getState().title, "svg"), svg, "image/svg+xml");
}

export async function exportPng(store: ScenarioStore, theme: ThemeName): Promise<void> {
  const svg = pictureOf(store, theme);
  if (svg) download(fileNameOf(store.getState().title, "png"), await svgToPng(svg, PNG_SCALE), "image/png");
}

/** Figures as text on the clipboard; where the browser refuses, as a file. */
export async function copyFigures(store: ScenarioStore): Promise<void> {
  const { shown, title, say } = store.getState();
  if (!shown) return;
  const text = figuresToText(shown.document, shown.simulation);
  try {
    await navigator.clipboard.writeText(text);
    say("Figures copied as text");
  } catch (cause) {
    console.warn("the clipboard refused", cause);
    download(fileNameOf(title, "txt"), text, "text/plain;charset=utf-8");
    say("The browser did not allow copying; the figures were saved as a file");
  }
}
