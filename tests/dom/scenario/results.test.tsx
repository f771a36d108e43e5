import { act, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { describe, expect, it, vi } from "vitest";
import { FiguresPanel } from "@/components/scenario/figures-panel";
import { InputsPanel } from "@/components/scenario/inputs-panel";
import { NoticesPanel } from "@/components/scenario/notices-panel";
import { WorkbenchFoot } from "@/components/scenario/workbench-foot";
import { directClient, renderScenario, shortDocument } from "./support";

const hasRun = (store: ReturnType<typeof renderScenario>["store"]) =>
  waitFor(() => expect(store.getState().run.phase).toBe("upToDate"));
const figure = (name: string) => document.querySelector<HTMLElement>(`[data-figure="${name}"]`)!;

describe("the figures", () => {
  it("show the run's own numbers with unit and sign", async () => {
    const { store } = renderScenario(<FiguresPanel />);
    await hasRun(store);
    const { motorRmsA } = store.getState().shown!.simulation.figures;
    expect(figure("motorRmsA")).toHaveTextContent(`${motorRmsA.toPrecision(3)}A`);
    expect(figure("motorMeanA").textContent).toMatch(/^[+−]/);
  });

  it("say why on focus: formula, numbers put in, source; Escape closes, choosing pins it at the foot", async () => {
    const { store } = renderScenario(<FiguresPanel />);
    await hasRun(store);
    const user = userEvent.setup();
    const why = screen.getByRole("button", { name: "RMS" });
    act(() => why.focus());
    const tip = await screen.findByRole("tooltip");
    expect(tip).toHaveTextContent(/I_rms = √.*from .*IEC 60050/);
    await user.keyboard("{Escape}");
    await waitFor(() => expect(screen.queryByRole("tooltip")).toBeNull());
    await user.click(why);
    expect(screen.getByRole("region", { name: "Why, pinned" })).toHaveTextContent("I_rms");
    expect(why).toHaveAttribute("aria-pressed", "true");
    await user.click(screen.getByRole("button", { name: "Unpin" }));
    expect(screen.queryByRole("region", { name: "Why, pinned" })).toBeNull();
  });

  it("show old and new while a slider moves, and the new alone afterwards", async () => {
    const { store } = renderScenario(<FiguresPanel />);
    await hasRun(store);
    const old = store.getState().shown!.simulation.figures.shuntAW!;
    act(() => {
      store.getState().beginDrag("sensing.shunt.resistanceOhm");
      store.getState().drag("sensing.shunt.resistanceOhm", 0.03);
    });
    await waitFor(() => expect(figure("shuntAW").textContent).toMatch(/ to\d/));
    expect(figure("shuntAW")).toHaveTextContent(`${(old * 1000).toPrecision(3)} mW to`);
    act(() => store.getState().endDrag());
    await waitFor(() => expect(figure("shuntAW").textContent).not.toContain("to"));
  });

  it("leave out what this run has not", async () => {
    const { store } = renderScenario(<FiguresPanel />, {
      document: shortDocument((document) => {
        document.sensing.site = "line";
        Object.assign(document.sensing.amplifier, { arrangement: "singleEnded", response: "bipolar" });
        delete document.sensing.reference;
      }),
    });
    await hasRun(store);
    expect(figure("shuntAW")).toBeInTheDocument();
    expect(figure("shuntBW")).toBeNull();
  });
});

describe("the notices", () => {
  it("go to the instant and to the field they name", async () => {
    const { store } = renderScenario(
      <>
        <InputsPanel />
        <NoticesPanel />
      </>,
    );
    await hasRun(store);
    const notice = store
      .getState()
      .shown!.simulation.notices.find((one) => one.timeS !== undefined && one.path !== undefined)!;
    const item = screen.getByText(notice.title).closest("li")!;
    const user = userEvent.setup();
    await user.click(within(item).getByRole("button", { name: /^Go to/ }));
    expect(store.getState().cursorS).toBe(notice.timeS);
    expect(store.getState().viewWindow.fromS).toBeLessThanOrEqual(notice.timeS!);
    expect(store.getState().viewWindow.toS).toBeGreaterThanOrEqual(notice.timeS!);
    await user.click(within(item).getByRole("button", { name: /^Change/ }));
    await waitFor(() =>
      expect(document.activeElement?.closest("[data-path]")?.getAttribute("data-path")).toContain(notice.path),
    );
  });

  it("list what is wrong with the inputs first, with a way to the field", async () => {
    const { store } = renderScenario(
      <>
        <InputsPanel />
        <NoticesPanel />
        <WorkbenchFoot />
      </>,
    );
    await hasRun(store);
    act(() => store.getState().change("run.durationS", 999));
    const first = screen.getByRole("region", { name: "Notices" }).querySelectorAll("li")[0]!;
    expect(first).toHaveTextContent(/Length of the run.*The run keeps the last values that fit together/);
    expect(first).toHaveTextContent(/^Fault: /);
    expect(screen.getByText(/Some inputs do not fit/)).toBeInTheDocument();
    await userEvent.click(within(first).getByRole("button", { name: "Go to length" }));
    await waitFor(() => expect(document.activeElement).toBe(screen.getByRole("textbox", { name: /^Length/ })));
  });

  it("say why a run failed, and offer two ways out", async () => {
    let mayRun = true;
    const engine = directClient();
    const client = () => ({
      ...engine,
      run: (...given: Parameters<typeof engine.run>) =>
        mayRun
          ? engine.run(...given)
          : Promise.resolve({
              ok: false as const,
              failure: { code: "engine.failed" as const, text: "The current grows without end." },
            }),
    });
    const { store } = renderScenario(<NoticesPanel />, { client });
    await hasRun(store);
    mayRun = false;
    act(() => store.getState().change("sensing.shunt.resistanceOhm", 0.02));
    expect(
      await screen.findByText(/The current grows without end\. The last good run is still shown/),
    ).toBeInTheDocument();
    expect(store.getState().shown?.document.sensing.shunt.resistanceOhm).toBe(0.0131);
    mayRun = true;
    await userEvent.click(screen.getByRole("button", { name: "Undo the last change" }));
    await hasRun(store);
    expect(screen.queryByText(/grows without end/)).toBeNull();
    vi.restoreAllMocks();
  });
});
