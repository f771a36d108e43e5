import { render, screen } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { Bridge } from "@/components/bridge/bridge";
import { ReadingStrip } from "@/components/bridge/reading-strip";
import { bandAt } from "@/components/plot/bands";
import { reversalDocument, runOf } from "../../unit/plot/reversal";

describe("the bridge", () => {
  it("is one picture whose name says the state", () => {
    const run = runOf(reversalDocument("legBottom"));
    render(<Bridge reading={run.readAt(2.25e-4)} band={bandAt(run.view.bands, 2.25e-4)} document={run.document} fullScaleA={6.5} />);
    expect(screen.getByRole("img")).toHaveAccessibleName(/^Return to supply: AL and BH\. Motor 3\.\d\d A forward\. The supply takes back 3\.\d\d A\./);
  });

  it("draws a staff for the shunts of all five sites", () => {
    for (const [site, count] of [["legTop", 2], ["legBottom", 2], ["line", 1], ["supply", 1], ["return", 1]] as const) {
      const run = runOf(reversalDocument(site));
      const { container, unmount } = render(<Bridge reading={run.readAt(2.25e-4)} document={run.document} fullScaleA={6.5} />);
      expect(container.querySelectorAll('rect[stroke-width="0.8"]')).toHaveLength(5 * count);
      expect(container.textContent).toContain("10 mΩ");
      unmount();
    }
  });

  it("says what the output should read where it does not", () => {
    const run = runOf(reversalDocument("legBottom"));
    const reading = run.readAt(2.25e-4);
    const { container, rerender } = render(<Bridge reading={reading} document={run.document} fullScaleA={6.5} idealV={2.573} />);
    expect(container.textContent).toContain("should be 2.573");
    rerender(<Bridge reading={reading} document={run.document} fullScaleA={6.5} idealV={reading.combinedV} />);
    expect(container.textContent).not.toContain("should be");
  });

  it("leaves the readings to a strip on a phone", () => {
    const run = runOf(reversalDocument("legTop"));
    const reading = run.readAt(2.25e-4);
    const { container } = render(
      <>
        <Bridge isPhone reading={reading} document={run.document} fullScaleA={6.5} />
        <ReadingStrip reading={reading} document={run.document} idealV={2.577} />
      </>,
    );
    expect(container.querySelector("svg")!.textContent).not.toContain("mV");
    expect(container.querySelector("dl")!.textContent).toMatch(/Shunt A0\.0 mV.*Combined1\.65\d V.*should be 2\.577 V/);
  });

  it("writes no text under 10.5 px at full size", () => {
    const run = runOf(reversalDocument("legTop"));
    const { container } = render(<Bridge reading={run.readAt(1e-4)} document={run.document} fullScaleA={6.5} />);
    const sizes = [...container.querySelectorAll("text, tspan")].map((text) => Number(text.getAttribute("font-size"))).filter((size) => size > 0);
    expect(sizes.length).toBeGreaterThan(15);
    expect(Math.min(...sizes)).toBeGreaterThanOrEqual(10.5);
  });
});
