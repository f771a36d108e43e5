import { parse } from "csv-parse/sync";
import { describe, expect, test } from "vitest";
import { createRun, simulate } from "@/lib/engine/index";
import { FIGURE_LIST } from "@/lib/explain/figure-list";
import { csvCell, figuresToCsv, figuresToText, viewToCsv } from "@/lib/scenario/csv";
import { templateById } from "@/lib/scenario/templates";

const document = { ...templateById("reversal")!.document, title: '=HYPERLINK("x"), "quoted"' };

function viewOf(columnCount: number, toS: number, durationS = document.run.durationS) {
  const run = createRun({ ...document, run: { durationS } });
  while (!run.advance(1000)) continue;
  return run.view({ fromS: 0, toS, columnCount });
}

describe("waveforms as CSV", () => {
  const exact = viewOf(2000, 1e-4);
  const rows = parse(viewToCsv(exact, document), { relax_column_count: true }) as string[][];

  test("have a title, a header with units and one row for each point", () => {
    expect(exact.kind).toBe("exact");
    expect(rows[1].slice(0, 3)).toEqual(["Time (s)", "Motor current (A)", "Speed (rad/s)"]);
    expect(rows).toHaveLength(exact.timeS.length + 2);
    for (const row of rows.slice(1)) expect(row).toHaveLength(rows[1].length);
  });
  test("give numbers back to the last bit", () => {
    const current = exact.traces.motorCurrentA!;
    expect(rows.slice(2).map((row) => Number(row[1]))).toEqual([...current.max]);
    expect(rows.slice(2).map((row) => Number(row[0]))).toEqual([...exact.timeS]);
  });
  test("of an envelope have smallest and largest", () => {
    const envelope = viewOf(40, 0.3, 0.3);
    expect(envelope.kind).toBe("envelope");
    const wide = parse(viewToCsv(envelope, document), { relax_column_count: true }) as string[][];
    expect(wide[1].slice(0, 3)).toEqual(["Time (s)", "Motor current (A) min", "Motor current (A) max"]);
    for (const row of wide.slice(2)) expect(Number(row[1])).toBeLessThanOrEqual(Number(row[2]));
  });
  test("end their lines as RFC 4180 says", () => {
    expect(viewToCsv(exact, document).split("\r\n").at(-1)).toBe("");
    expect(viewToCsv(exact, document).replaceAll("\r\n", "")).not.toMatch(/[\r\n]/);
  });
});

describe("no cell runs as a formula", () => {
  test.each([
    ["=1+1", "'=1+1"],
    ["+cmd", "'+cmd"],
    ["-2 A drive", "'-2 A drive"],
    ["@sum", "'@sum"],
    ["\t=1", "'\t=1"],
    ["  =1", "'  =1"],
    ['=a,"b"', `"'=a,""b"""`],
    ["a\nb", '"a\nb"'],
    ["gate, left", '"gate, left"'],
    ["plain", "plain"],
  ])("%j", (text, cell) => {
    expect(csvCell(text)).toBe(cell);
  });
  test("numbers keep their sign and what is none stays empty", () => {
    expect([csvCell(-0.25), csvCell(1e-9), csvCell(null), csvCell(NaN)]).toEqual(["-0.25", "1e-9", "", ""]);
  });
  test("the title of this document", () => {
    expect(viewToCsv(viewOf(2000, 1e-4), document)).toMatch(/^"'=HYPERLINK\(""x""\), ""quoted"""\r\n/);
  });
});

describe("figures", () => {
  const simulation = simulate(document);
  test("as CSV have a row each, with the SI value and as shown", () => {
    const rows = parse(figuresToCsv(document, simulation), { relax_column_count: true }) as string[][];
    expect(rows).toHaveLength(FIGURE_LIST.length + 2);
    const mean = rows.find((row) => row[1] === "motorMeanA")!;
    expect(Number(mean[2])).toBe(simulation.figures.motorMeanA);
    expect(mean[3]).toBe("A");
    expect(mean[4]).toMatch(/^[\d.\u2212]+ A$/);
  });
  test("as text name the window and leave out what the run has not", () => {
    const text = figuresToText(document, simulation);
    expect(text.split("\n")[1]).toBe("Figures from 1.5 ms to 4.5 ms");
    expect(text).toMatch(/ {2}Average motor current +\u2212?\d/);
    expect(text).not.toContain("Commutation ripple");
    const coil = templateById("battery-coil")!.document;
    const alone = figuresToText(coil, simulate(coil));
    expect(alone).toContain("Dissipation, shunt ");
    expect(alone).not.toMatch(/shunt B|Output B|NaN|null|undefined/);
  });
});
