import { act, fireEvent, render, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { beforeEach, describe, expect, it, vi } from "vitest";
import { ScenarioWorkbench, type ScenarioWorkbenchProps } from "@/components/scenario/scenario-workbench";
import type { ScenarioActions } from "@/components/scenario/scenario-actions";
import { failure, success } from "@/lib/result";
import { directClient, initialOf, memoryStorage, router, shortDocument, WithRouter } from "./support";

const document_ = shortDocument();
const theirs = shortDocument((document) => (document.sensing.amplifier.gain = { fixed: 23 }));

function openPage(props: Partial<ScenarioWorkbenchProps> = {}, actions: Partial<ScenarioActions> = {}) {
  const storage = props.storage ?? memoryStorage();
  render(
    <WithRouter>
      <ScenarioWorkbench
        initial={initialOf(document_)}
        createClient={directClient}
        storage={storage}
        actions={actions}
        mayDuplicate
        {...props}
      />
    </WithRouter>,
  );
  return { storage, user: userEvent.setup() };
}
const shunt = () => screen.getByRole<HTMLInputElement>("textbox", { name: /^Shunt value/ });
async function setShunt(user: ReturnType<typeof userEvent.setup>, text: string) {
  await user.click(shunt());
  await user.clear(shunt());
  await user.keyboard(`${text}{Enter}`);
}
beforeEach(() => vi.clearAllMocks());

describe("the scenario page", () => {
  it("always says what is saved and what is not, and saves with a message", async () => {
    const saveRevision = vi
      .fn<ScenarioActions["saveRevision"]>()
      .mockResolvedValue(success({ number: 8, revisionId: "r8" }));
    const { user } = openPage({}, { saveRevision });
    expect(await screen.findByText(/^rev 7 · saved/)).toBeInTheDocument();
    expect(screen.getByRole("button", { name: "Save revision" })).toBeDisabled();
    await setShunt(user, "22");
    expect(screen.getByText("rev 7 · 1 change not saved")).toBeInTheDocument();
    await user.keyboard("{Control>}s{/Control}");
    const dialog = screen.getByRole("dialog", { name: "Save rev 8" });
    expect(dialog).toHaveTextContent("Shunt resistance 13.1 mΩ to 22 mΩ");
    await user.type(within(dialog).getByRole("textbox"), "for the stall");
    await user.click(within(dialog).getByRole("button", { name: "Save rev 8" }));
    expect(saveRevision).toHaveBeenCalledWith(
      expect.objectContaining({ message: "for the stall", baseRevisionNumber: 7 }),
    );
    expect(await screen.findByText(/^rev 8 · saved/)).toBeInTheDocument();
  });

  it("undoes and redoes by key, with the words on the button", async () => {
    const { user } = openPage();
    await setShunt(user, "22");
    expect(screen.getByRole("button", { name: "Undo: shunt resistance 13.1 to 22 mΩ" })).toBeEnabled();
    await user.keyboard("{Control>}z{/Control}");
    expect(shunt()).toHaveValue("13.1");
    await user.keyboard("{Control>}y{/Control}");
    expect(shunt()).toHaveValue("22");
  });

  it("shows both versions when someone else saved first, and keeps mine as a new revision", async () => {
    const saveRevision: ScenarioActions["saveRevision"] = async ({ document }) =>
      failure("edit.conflict", {
        detail: {
          newest: { number: 8, authorName: "Jonas", createdAt: new Date(), document: theirs },
          kept: { draftId: "d1", document },
        },
      });
    const keepMineAsRevision = vi
      .fn<ScenarioActions["keepMineAsRevision"]>()
      .mockResolvedValue(success({ number: 9, revisionId: "r9" }));
    const { user } = openPage({}, { saveRevision, keepMineAsRevision });
    await setShunt(user, "22");
    await user.click(screen.getByRole("button", { name: "Save revision" }));
    await user.click(within(screen.getByRole("dialog")).getByRole("button", { name: "Save rev 8" }));
    const banner = await screen.findByRole("alert");
    expect(banner).toHaveTextContent(
      "Jonas saved rev 8 while you were editing rev 7. You changed shunt resistance; rev 8 changed gain.",
    );
    await user.click(within(banner).getByRole("button", { name: "Compare" }));
    const rows = within(screen.getByRole("dialog"))
      .getAllByRole("row")
      .map((row) => row.textContent);
    expect(rows).toContain("Shunt resistance13.1 mΩ13.1 mΩ22 mΩ");
    expect(rows).toContain("Gain19 V/V23 V/V19 V/V");
    await user.click(within(screen.getByRole("dialog")).getByRole("button", { name: "Keep mine as rev 9" }));
    expect(await screen.findByText(/^rev 9 · saved/)).toBeInTheDocument();
    expect(keepMineAsRevision).toHaveBeenCalledWith(expect.objectContaining({ draftId: "d1", baseRevisionNumber: 8 }));
  });

  it("works on without the server and says since when", async () => {
    vi.spyOn(console, "warn").mockImplementation(() => undefined);
    const { user } = openPage({}, { saveRevision: () => Promise.reject(new TypeError("fetch failed")) });
    await setShunt(user, "22");
    await user.keyboard("{Control>}s{/Control}");
    await user.click(within(screen.getByRole("dialog")).getByRole("button", { name: "Save rev 8" }));
    expect(await screen.findByText(/Your work is kept here/)).toBeInTheDocument();
    await user.keyboard("{Escape}");
    expect(screen.getByText(/^Working here; not saved since/)).toBeInTheDocument();
  });

  it("brings back what a closed tab left, with a way to discard it", async () => {
    const storage = memoryStorage();
    const kept = structuredClone(document_);
    kept.sensing.shunt.resistanceOhm = 0.033;
    const initial = initialOf(document_);
    storage.kept.set(`slackwater.draft/${initial.personId}/${initial.scenarioId}`, {
      base: initial.base,
      document: kept,
      keptAtMs: Date.now(),
    });
    const { user } = openPage({ storage });
    expect(await screen.findByText("1 change of yours came back.")).toBeInTheDocument();
    expect(shunt()).toHaveValue("33");
    await user.click(screen.getByRole("button", { name: "Discard, show rev 7" }));
    expect(shunt()).toHaveValue("13.1");
    expect(screen.queryByText(/came back/)).toBeNull();
  });

  it("takes a document from a file as one step, and names every problem of one it refuses", async () => {
    const { user } = openPage();
    const open = async () => {
      await user.click(screen.getByRole("button", { name: "More" }));
      await user.click(await screen.findByRole("menuitem", { name: "Import document …" }));
    };
    await open();
    const broken = {
      ...document_,
      supply: { ...document_.supply, voltageV: -4 },
      pwm: { ...document_.pwm, frequencyHz: 3 },
    };
    await user.upload(
      screen.getByLabelText("File"),
      new File([JSON.stringify(broken)], "gate.json", { type: "application/json" }),
    );
    const alert = await within(screen.getByRole("dialog")).findByRole("alert");
    expect(alert).toHaveTextContent("Nothing was changed");
    expect(alert).toHaveTextContent("supply.voltageV");
    expect(alert).toHaveTextContent("pwm.frequencyHz");
    await user.upload(
      screen.getByLabelText("File"),
      new File([JSON.stringify(theirs)], "theirs.json", { type: "application/json" }),
    );
    await waitFor(() => expect(screen.queryByRole("dialog")).toBeNull());
    expect(screen.getByRole("textbox", { name: /^Gain/ })).toHaveValue("23");
    expect(screen.getByRole("button", { name: "Undo: import of theirs.json" })).toBeEnabled();
  });

  it("lets someone who may not save play, and copies their changes into a scenario of their own", async () => {
    const duplicateScenario = vi
      .fn<ScenarioActions["duplicateScenario"]>()
      .mockResolvedValue(success({ id: "copy-1" }));
    const saveRevision = vi
      .fn<ScenarioActions["saveRevision"]>()
      .mockResolvedValue(success({ number: 2, revisionId: "r" }));
    const { user } = openPage({ initial: initialOf(document_, { mode: "read" }) }, { duplicateScenario, saveRevision });
    expect(screen.queryByRole("button", { name: "Save revision" })).toBeNull();
    await setShunt(user, "22");
    await user.click(screen.getByRole("button", { name: "Duplicate with my changes" }));
    await waitFor(() => expect(router.push).toHaveBeenCalledWith("/scenarios/copy-1"));
    expect(saveRevision.mock.calls[0]?.[0]).toMatchObject({
      scenarioId: "copy-1",
      document: { sensing: { shunt: { resistanceOhm: 0.022 } } },
    });
  });

  it("keeps nothing of a guest and says so", async () => {
    const { user, storage } = openPage({
      initial: initialOf(document_, { mode: "guest", scenarioId: null, personId: null }),
    });
    await setShunt(user, "22");
    expect(screen.getByText("rev 7 · 1 change, nothing is kept")).toBeInTheDocument();
    expect((storage as ReturnType<typeof memoryStorage>).kept.size).toBe(0);
  });

  it("starts a draft on an approved revision only when asked", async () => {
    const { user } = openPage({ initial: initialOf(document_, { revisionState: "approved" }) });
    expect(screen.queryByRole("textbox", { name: /^Shunt value/ })).toBeNull();
    await user.click(screen.getByRole("button", { name: "Start rev 8" }));
    expect(shunt()).toBeInTheDocument();
  });

  it("lists its keys under the question mark, which can be switched off with the letters", async () => {
    const { user } = openPage();
    fireEvent.keyDown(document.body, { key: "?" });
    const dialog = await screen.findByRole("dialog", { name: "Keys" });
    expect(dialog).toHaveTextContent("ten steps");
    await user.click(within(dialog).getByRole("checkbox"));
    await user.keyboard("{Escape}");
    fireEvent.keyDown(document.body, { key: "?" });
    expect(screen.queryByRole("dialog")).toBeNull();
  });

  it("goes round its regions by F6", async () => {
    openPage();
    await screen.findByLabelText("Waveforms of the run");
    const names = [1, 2, 3, 4, 5].map(() => {
      fireEvent.keyDown(document.activeElement ?? document.body, { key: "F6" });
      return document.activeElement?.getAttribute("data-region");
    });
    expect(names).toEqual(["head", "inputs", "run", "results", "head"]);
  });

  it("moves only what belongs to the cursor when the cursor moves", async () => {
    openPage();
    const plot = await screen.findByLabelText("Waveforms of the run");
    await waitFor(() => expect(screen.getByText("Up to date")).toBeInTheDocument());
    const still = ["Inputs", "Figures"].map((name) => screen.getByRole("region", { name: new RegExp(`^${name}$`) }));
    const now = () => document.querySelector('[role="row"][aria-current="true"]')?.textContent;
    const before = now();
    const changes: MutationRecord[] = [];
    const observer = new MutationObserver((list) => changes.push(...list));
    still.forEach((region) =>
      observer.observe(region, { subtree: true, childList: true, attributes: true, characterData: true }),
    );
    await act(async () => {
      fireEvent.keyDown(plot, { key: "ArrowRight" });
      await new Promise((resolve) => setTimeout(resolve, 50));
    });
    expect(now()).not.toBe(before);
    expect(changes.concat(observer.takeRecords())).toEqual([]);
    observer.disconnect();
  });
});
