import { act, fireEvent, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { describe, expect, it } from "vitest";
import { InputsPanel } from "@/components/scenario/inputs-panel";
import { renderScenario } from "./support";

const SHUNT = "sensing.shunt.resistanceOhm";
const shunt = () => screen.getByRole<HTMLInputElement>("textbox", { name: /^Shunt value/ });

describe("the inputs panel", () => {
  it("opens with the duties and the shunt, and shows closed sections in one line", () => {
    renderScenario(<InputsPanel />);
    expect(screen.getByRole("textbox", { name: /^Duty at the start/ })).toHaveValue("53");
    expect(shunt()).toHaveValue("13.1");
    const supply = screen.getByRole("button", { name: /Supply/ });
    expect(supply).toHaveAttribute("aria-expanded", "false");
    expect(supply).toHaveTextContent("26.3 V");
  });

  it("marks a value changed in this draft and says the old one", async () => {
    const { store } = renderScenario(<InputsPanel />);
    const user = userEvent.setup();
    await user.click(shunt());
    await user.clear(shunt());
    await user.keyboard("22{Enter}");
    expect(store.getState().document.sensing.shunt.resistanceOhm).toBe(0.022);
    expect(shunt().closest("[data-row]")).toHaveAttribute("title", "Changed in this draft, was 13.1 mΩ");
  });

  it("moves the slider by keys, with its value in words, and goes back to the saved value by Backspace", () => {
    const { store } = renderScenario(<InputsPanel />);
    const slider = screen.getByRole("slider", { name: "Shunt resistance" });
    expect(slider).toHaveAttribute("aria-valuetext", "13.1 mΩ");
    fireEvent.keyDown(slider, { key: "PageUp" });
    expect(slider).toHaveAttribute("aria-valuetext", "15 mΩ");
    fireEvent.keyDown(slider, { key: "Backspace" });
    expect(store.getState().document.sensing.shunt.resistanceOhm).toBe(0.0131);
  });

  it("follows a drag along the line, snaps to preferred values, and makes one step of it", () => {
    const { store } = renderScenario(<InputsPanel />);
    const slider = screen.getByRole("slider", { name: "Shunt resistance" });
    const track = slider.parentElement!;
    track.getBoundingClientRect = () => ({
      left: 100,
      width: 240,
      right: 340,
      top: 0,
      bottom: 1,
      height: 1,
      x: 100,
      y: 0,
      toJSON: () => ({}),
    });
    const strip = track.parentElement!;
    fireEvent.pointerDown(strip, { clientX: 230, button: 0, pointerId: 1 });
    fireEvent.pointerMove(strip, { clientX: 260, pointerId: 1 });
    expect(store.getState().gesture?.path).toBe(SHUNT);
    // log scale from 0.2 mΩ to 0.5 Ω: two thirds of the way is 36.8 mΩ, and 36 mΩ is within 6 px
    expect(store.getState().document.sensing.shunt.resistanceOhm).toBe(0.036);
    fireEvent.pointerUp(strip, { pointerId: 1 });
    expect(store.getState().history.past.map((edit) => edit.label)).toEqual(["shunt resistance 13.1 to 36 mΩ"]);
  });

  it("keeps a refused entry through closing its section, and says that the section needs a look", async () => {
    const { store } = renderScenario(<InputsPanel />);
    const user = userEvent.setup();
    await user.click(shunt());
    await user.clear(shunt());
    await user.keyboard("90 ohm{Tab}");
    expect(store.getState().document.sensing.shunt.resistanceOhm).toBe(0.0131);
    const section = screen.getByRole("button", { name: /^Sensing/ });
    await user.click(section);
    expect(section).toHaveTextContent("needs a look");
    await user.click(section);
    expect(shunt()).toHaveValue("90 ohm");
    expect(screen.getByRole("alert")).toHaveTextContent("The run keeps 13.1 mΩ");
  });

  it("shows at its field what is wrong between fields", () => {
    const { store } = renderScenario(<InputsPanel />);
    act(() =>
      store.getState().replaceDocument(
        {
          ...store.getState().document,
          command: {
            ...store.getState().document.command,
            points: [
              { timeS: 0, duty: 0.5, ramp: "step" },
              { timeS: 0, duty: -0.2, ramp: "step" },
            ],
          },
        },
        "import",
      ),
    );
    expect(store.getState().findings).not.toHaveLength(0);
    const path = store.getState().findings[0]!.path;
    const row = document.querySelector(`[data-path="${path}"]`);
    expect(within(row as HTMLElement).getByRole("alert")).toHaveTextContent(store.getState().findings[0]!.text);
  });

  it("opens the section of a wanted field, in full if it is a detail, and focuses it", async () => {
    const { store } = renderScenario(<InputsPanel />);
    act(() => store.getState().wantField("sensing.converter.inlLsb"));
    await waitFor(() => expect(document.activeElement).toBe(screen.getByRole("textbox", { name: "Non-linearity" })));
    act(() => store.getState().wantField("bridge.deadTimeS"));
    await waitFor(() => expect(document.activeElement).toBe(screen.getByRole("textbox", { name: /^Dead time/ })));
  });

  it("adds a command point and removes it with a way back", async () => {
    const { store } = renderScenario(<InputsPanel />);
    const user = userEvent.setup();
    await user.click(screen.getByRole("button", { name: "Add a command point" }));
    expect(store.getState().document.command.points).toHaveLength(3);
    await user.click(screen.getByRole("button", { name: "Remove point 3" }));
    expect(store.getState().document.command.points).toHaveLength(2);
    expect(store.getState().said).toMatchObject({ text: "Point 3 removed", canUndo: true });
    expect(screen.queryByRole("button", { name: "Remove point 1" })).toBeNull();
  });

  it("offers only what fits the rest when a choice is made", async () => {
    const { store } = renderScenario(<InputsPanel />);
    await userEvent.selectOptions(screen.getByRole("combobox", { name: "Shunts" }), "line");
    expect(store.getState().findings).toEqual([]);
    const readAs = screen.getByRole("combobox", { name: "Read as" });
    expect(within(readAs).queryByRole("option", { name: "Difference" })).toBeNull();
  });

  it("shows an approved revision as text until a new draft is started", () => {
    const { store } = renderScenario(<InputsPanel />, { initial: { revisionState: "approved" } });
    expect(screen.queryByRole("textbox")).toBeNull();
    expect(screen.getByLabelText(/^Shunt value/)).toHaveTextContent("13.1 mΩ");
    act(() => store.getState().unlock());
    expect(shunt()).toBeInTheDocument();
  });

  it("is not drawn again when the cursor moves", () => {
    const { store } = renderScenario(<InputsPanel />);
    const before = shunt();
    let changes = 0;
    const observer = new MutationObserver((list) => (changes += list.length));
    observer.observe(document.body, { subtree: true, childList: true, attributes: true, characterData: true });
    for (let index = 0; index < 20; index += 1) act(() => store.getState().setCursor(index * 1e-5));
    expect(observer.takeRecords().length + changes).toBe(0);
    expect(shunt()).toBe(before);
    observer.disconnect();
  });
});
