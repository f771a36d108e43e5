import { act, fireEvent, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { afterEach, describe, expect, it, vi } from "vitest";
import { EventsTable } from "@/components/plot/events";
import { RunOverview } from "@/components/plot/overview";
import { RunPlot } from "@/components/plot/run-plot";
import type { PlotWindow } from "@/components/plot/scale";
import { StepBar } from "@/components/plot/step-bar";
import { reversalDocument, runOf } from "../../unit/plot/reversal";

const run = runOf(reversalDocument("legBottom"));
const whole: PlotWindow = { fromS: 0, toS: 6e-4 };

type Seen = { cursorS: number; window: PlotWindow; pinS: number | null };

function Page({ seen, areLettersOn = true, startS = 2.1e-4 }: { seen: Seen; areLettersOn?: boolean; startS?: number }) {
  const [cursorS, setCursor] = useState(startS);
  const [viewWindow, setWindow] = useState(whole);
  const [pinS, setPin] = useState<number | null>(null);
  Object.assign(seen, { cursorS, window: viewWindow, pinS });
  const shared = { view: run.view, simulation: run.simulation, document: run.document, cursorS, onCursor: setCursor };
  return (
    <>
      <StepBar {...shared} />
      <RunOverview {...shared} overview={run.overview} viewWindow={viewWindow} onViewWindow={setWindow} theme="light" />
      <EventsTable {...shared} />
      <RunPlot {...shared} overview={run.overview} reading={run.readAt(cursorS)} viewWindow={viewWindow} onViewWindow={setWindow} pinS={pinS} onPin={setPin} theme="light" areLettersOn={areLettersOn} />
    </>
  );
}

function open(more: { areLettersOn?: boolean; startS?: number } = {}): Seen {
  const seen = {} as Seen;
  render(<Page seen={seen} {...more} />);
  return seen;
}

const region = () => screen.getByRole("group", { name: "Waveforms of the run" });
const lanes = () => region().querySelectorAll<HTMLElement>("[data-lane]");

afterEach(() => vi.useRealTimers());

describe("the run by keyboard", () => {
  it("steps by event, period, milestone and sample", async () => {
    const user = userEvent.setup();
    const seen = open();
    region().focus();
    await user.keyboard("{ArrowRight}");
    expect(seen.cursorS).toBeCloseTo(2.1625e-4, 9);
    await user.keyboard("{Shift>}{ArrowRight}{/Shift}");
    expect(seen.cursorS).toBeCloseTo(2.6625e-4, 9);
    await user.keyboard(",");
    expect(seen.cursorS).toBeCloseTo(2.25e-4, 9);
    await user.keyboard("[[");
    expect(seen.cursorS).toBeCloseTo(2e-4, 9);
    await user.keyboard("{End}");
    expect(seen.cursorS).toBe(6e-4);
  });

  it("pins, zooms and comes back to the whole run", async () => {
    const user = userEvent.setup();
    const seen = open();
    region().focus();
    await user.keyboard("p");
    expect(seen.pinS).toBe(2.1e-4);
    await user.keyboard("z");
    expect(seen.window.toS - seen.window.fromS).toBeCloseTo(6e-5, 9);
    await user.keyboard("0");
    expect(seen.window).toEqual(whole);
    await user.keyboard("{Shift>}P{/Shift}");
    expect(seen.pinS).toBeNull();
  });

  it("leaves single letters alone when they are switched off", async () => {
    const user = userEvent.setup();
    const seen = open({ areLettersOn: false });
    region().focus();
    await user.keyboard("pz]");
    expect(seen).toEqual({ cursorS: 2.1e-4, window: whole, pinS: null });
    await user.keyboard("{ArrowRight}");
    expect(seen.cursorS).toBeGreaterThan(2.1e-4);
  });

  it("is one tab stop until Enter opens the lanes, and Escape leaves them", async () => {
    const user = userEvent.setup();
    open();
    expect([...lanes()].every((lane) => lane.tabIndex === -1)).toBe(true);
    region().focus();
    await user.keyboard("{Enter}");
    await act(() => new Promise((resolve) => requestAnimationFrame(resolve)));
    expect([...lanes()].every((lane) => lane.tabIndex === 0)).toBe(true);
    expect(document.activeElement).toBe(lanes()[0]);
    await user.tab();
    expect(document.activeElement).toBe(lanes()[1]);
    await user.keyboard("{Escape}");
    expect(document.activeElement).toBe(region());
    expect(lanes()[0]!.tabIndex).toBe(-1);
  });

  it("reads a lane aloud on Enter", async () => {
    const user = userEvent.setup();
    open({ startS: 2.25e-4 });
    region().focus();
    await user.keyboard("{Enter}");
    await act(() => new Promise((resolve) => requestAnimationFrame(resolve)));
    const motor = region().querySelector<HTMLElement>('[data-lane="motor"]')!;
    act(() => motor.focus());
    await user.keyboard("{Enter}");
    expect(screen.getAllByRole("status").map((status) => status.textContent)).toContainEqual(expect.stringMatching(/^Motor current: true \+3\.\d\d A, sample 5/));
  });
});

describe("what is announced", () => {
  it("comes at most every 500 ms and ends on the newest", () => {
    vi.useFakeTimers();
    open();
    const status = () => within(region()).getAllByRole("status")[0]!.textContent;
    expect(status()).toBe("");
    fireEvent.keyDown(region(), { key: "ArrowRight" });
    act(() => void vi.advanceTimersByTime(1));
    expect(status()).toMatch(/^216\.25 µs, motor \+4\.\d\d A, combined/);
    const first = status();
    fireEvent.keyDown(region(), { key: "ArrowRight" });
    fireEvent.keyDown(region(), { key: "." });
    act(() => void vi.advanceTimersByTime(450));
    expect(status()).toBe(first);
    act(() => void vi.advanceTimersByTime(100));
    expect(status()).toMatch(/^225\.00 µs, sample 5, motor \+3\.\d\d A, combined 1\.65\d V, misses 3\.\d\d A$/);
  });
});

describe("buttons do what drags do", () => {
  it("zoom, pan, pin, span", async () => {
    const user = userEvent.setup();
    const seen = open();
    await user.click(screen.getByRole("button", { name: "Zoom in" }));
    const zoomed = seen.window;
    expect(zoomed.toS - zoomed.fromS).toBeCloseTo(3e-4, 9);
    await user.click(screen.getByRole("button", { name: "Show later" }));
    expect(seen.window.fromS).toBeGreaterThan(zoomed.fromS);
    await user.click(screen.getByRole("button", { name: "Pin here" }));
    await user.click(screen.getByRole("button", { name: "Next milestone" }));
    const span = screen.getByRole("region", { name: "Between pin and cursor" });
    expect(within(span).getByRole("row", { name: /^Average/ })).toBeInTheDocument();
    await user.click(screen.getByRole("button", { name: "Zoom to the span between pin and cursor" }));
    expect(seen.window.fromS).toBeLessThan(seen.pinS!);
    expect(seen.window.toS).toBeGreaterThan(seen.cursorS);
  });

  it("choose lanes", async () => {
    const user = userEvent.setup();
    open();
    expect(region().querySelector('[data-lane="speed"]')).toBeNull();
    await user.click(screen.getByText("Lanes"));
    await user.click(screen.getByRole("checkbox", { name: "Speed" }));
    expect(region().querySelector('[data-lane="speed"]')).not.toBeNull();
  });

  it("show the values as a table", async () => {
    const user = userEvent.setup();
    open();
    await user.click(screen.getByRole("button", { name: "Table" }));
    const table = within(screen.getByRole("region", { name: "Values at events and samples" })).getByRole("table");
    expect(within(table).getByRole("columnheader", { name: "Motor, A" })).toBeInTheDocument();
    expect(within(table).getByRole("cell", { name: "Sample 5" })).toBeInTheDocument();
  });
});

describe("pointer", () => {
  const surface = () => region().querySelector<HTMLElement>('[class*="surface"]')!;

  it("moves the cursor, and with Shift pins the start of a span", () => {
    const seen = open();
    fireEvent.pointerDown(surface(), { clientX: 300, pointerId: 1, button: 0, shiftKey: true });
    fireEvent.pointerMove(surface(), { clientX: 400, pointerId: 1 });
    fireEvent.pointerUp(surface(), { clientX: 400, pointerId: 1, shiftKey: true });
    expect(seen.pinS).not.toBeNull();
    expect(seen.cursorS).toBeGreaterThan(seen.pinS!);
  });

  it("zooms with Ctrl and the wheel, and lets a plain wheel scroll the page", () => {
    const seen = open();
    const plain = new WheelEvent("wheel", { deltaY: 100, bubbles: true, cancelable: true });
    act(() => void surface().dispatchEvent(plain));
    expect(plain.defaultPrevented).toBe(false);
    expect(seen.window).toEqual(whole);
    const zoom = new WheelEvent("wheel", { deltaY: -200, ctrlKey: true, clientX: 300, bubbles: true, cancelable: true });
    act(() => void surface().dispatchEvent(zoom));
    expect(zoom.defaultPrevented).toBe(true);
    expect(seen.window.toS - seen.window.fromS).toBeLessThan(6e-4);
  });
});

describe("events and overview", () => {
  it("mark the row in force and move the cursor by row", async () => {
    const user = userEvent.setup();
    const seen = open({ startS: 2.25e-4 });
    const table = screen.getByRole("table", { name: "Events of the run" });
    expect(within(table).getByRole("row", { current: true })).toHaveTextContent("Sample 5");
    screen.getByRole("rowgroup", { name: /up and down/ }).focus();
    await user.keyboard("{ArrowUp}");
    expect(seen.cursorS).toBeCloseTo(2.1725e-4, 9);
    expect(within(table).getByRole("row", { current: true })).toHaveTextContent("BH on: return");
  });

  it("move the window by arrow keys on its bracket", async () => {
    const user = userEvent.setup();
    const seen = open();
    await user.click(screen.getByRole("button", { name: "Zoom in" }));
    const before = seen.window.fromS;
    const bracket = screen.getByRole("slider", { name: "Visible window" });
    bracket.focus();
    await user.keyboard("{ArrowRight}");
    expect(seen.window.fromS).toBeGreaterThan(before);
    expect(bracket).toHaveAttribute("aria-valuetext", expect.stringContaining(" to "));
  });

  it("plays one event a second and stops on demand", () => {
    vi.useFakeTimers();
    const seen = open();
    fireEvent.click(screen.getByRole("button", { name: "Play" }));
    act(() => void vi.advanceTimersByTime(1000));
    expect(seen.cursorS).toBeCloseTo(2.1625e-4, 9);
    act(() => void vi.advanceTimersByTime(1000));
    expect(seen.cursorS).toBeCloseTo(2.1725e-4, 9);
    fireEvent.click(screen.getByRole("button", { name: "Pause" }));
    act(() => void vi.advanceTimersByTime(3000));
    expect(seen.cursorS).toBeCloseTo(2.1725e-4, 9);
  });
});
