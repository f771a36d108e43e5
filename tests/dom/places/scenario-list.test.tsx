import { render, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { beforeEach, describe, expect, it, vi } from "vitest";
import type { ListActions } from "@/components/list/list-actions";
import { ScenarioTable } from "@/components/list/scenario-table";
import type { ScenarioFilter, ScenarioList, ScenarioRow } from "@/db/queries/scenarios";
import { failure, success } from "@/lib/result";
import { router, shortDocument, WithRouter } from "../scenario/support";

const summary = { motorRmsA: 3.541, motorRippleA: 0.752, headroomV: 0.27, clippedShare: 0, reconstructionErrorMaxA: 0.094, errorLimitA: 0.15, spark: { fromS: 0, toS: 1, minA: [4, -2], maxA: [5, -1] }, scaleA: 5 };
const rowOf = (id: string, title: string, change: Partial<ScenarioRow> = {}): ScenarioRow => ({
  id, title, tags: ["gate"], state: "draft", ownerId: "o1", ownerName: "Runa Tamsel", revisionNumber: 3, changedAt: new Date(), isArchived: false, summary, mayEdit: true, mayDuplicate: true, mayArchive: true, ...change,
});
const ROWS = [
  rowOf("a", "Sluice drive"),
  rowOf("b", "Weir drive", { state: "approved", summary: { ...summary, clippedShare: 0.1, reconstructionErrorMaxA: 3.83 } }),
  rowOf("c", "Pump", { summary: null, mayDuplicate: false, mayArchive: false }),
];
const listOf = (rows: ScenarioRow[], change: Partial<ScenarioList> = {}): ScenarioList => ({
  rows, total: rows.length, page: 1, pageCount: 1,
  counts: { all: 3, mine: 1, archived: 4, draft: 2, inReview: 0, approved: 1, superseded: 0 },
  owners: [{ id: "o1", name: "Runa Tamsel" }, { id: "o2", name: "Edda Morwen" }], tags: ["gate", "pump"], ...change,
});
const actions = {
  createScenario: vi.fn<ListActions["createScenario"]>(),
  duplicateScenario: vi.fn<ListActions["duplicateScenario"]>(),
  readDocument: vi.fn<ListActions["readDocument"]>(),
  archiveScenario: vi.fn<ListActions["archiveScenario"]>(),
  restoreScenario: vi.fn<ListActions["restoreScenario"]>(),
};
type Props = Parameters<typeof ScenarioTable>[0];
const draw = (change: Partial<Props> = {}) =>
  render(
    <WithRouter>
      <ScenarioTable list={listOf(ROWS)} filter={{ page: 1 }} pageSize={50} workspaceName="Low Meadow" mayCreate role="designer" templates={[{ id: "t1", title: "Gate drive", purpose: "A reversal.", tags: [] }]} actions={actions} {...change} />
    </WithRouter>,
  );
const rowNamed = (title: string) => screen.getByRole("link", { name: title }).closest("tr")!;
const menuOf = async (title: string) => {
  await userEvent.click(screen.getByRole("button", { name: `Actions for ${title}` }));
  return screen.findByRole("menu");
};

beforeEach(() => {
  localStorage.clear();
  [...Object.values(actions), router.push, router.refresh].forEach((mock) => mock.mockReset());
});

describe("the filters of the list", () => {
  const filter: ScenarioFilter = { tag: "gate", page: 2 };

  it("puts a search into the address beside the filters that stand, from the first page", async () => {
    draw({ filter });
    await userEvent.type(screen.getByRole("searchbox"), "weir & sluice{Enter}");
    expect(router.push).toHaveBeenCalledExactlyOnceWith("/scenarios?q=weir+%26+sluice&tag=gate");
  });

  it("has a link with its count for every state and marks the one that is on", () => {
    draw({ filter: { state: "approved", page: 1 } });
    const states = within(screen.getByRole("navigation", { name: "State" }));
    expect(states.getAllByRole("link").map((link) => link.textContent)).toEqual(["All 3", "Draft 2", "In review 0", "Approved 1", "Archived 4"]);
    expect(states.getByRole("link", { current: true })).toHaveTextContent("Approved 1");
    expect(states.getByRole("link", { name: "Archived 4" })).toHaveAttribute("href", "/scenarios?archived=1");
  });

  it("goes to an owner, and back to anyone", async () => {
    draw({ filter });
    await userEvent.selectOptions(screen.getByRole("combobox", { name: /Owner/ }), "Edda Morwen");
    expect(router.push).toHaveBeenLastCalledWith("/scenarios?owner=o2&tag=gate");
    await userEvent.selectOptions(screen.getByRole("combobox", { name: /Tag/ }), "any");
    expect(router.push).toHaveBeenLastCalledWith("/scenarios");
  });

  it("says that nothing matches and offers the way back", () => {
    draw({ list: listOf([]), filter });
    expect(screen.getByText("Nothing matches these filters.")).toBeVisible();
    expect(screen.getByRole("link", { name: "Clear the filters" })).toHaveAttribute("href", "/scenarios");
    expect(screen.queryByRole("table")).toBeNull();
  });

  it("links to the pages round the one shown, filters kept", () => {
    draw({ list: listOf(ROWS, { total: 103, page: 2, pageCount: 3 }), filter });
    expect(screen.getByText("51–53 of 103")).toBeVisible();
    expect(screen.getByRole("link", { name: "Previous" })).toHaveAttribute("href", "/scenarios?tag=gate");
    expect(screen.getByRole("link", { name: "Next" })).toHaveAttribute("href", "/scenarios?tag=gate&page=3");
  });
});

describe("a row of the list", () => {
  it("shows the figures of the last run, and that its error passes its limit", () => {
    draw();
    expect(rowNamed("Sluice drive")).toHaveTextContent(/3\.54.*0\.75.*0\.27.*±0\.094/);
    expect(rowNamed("Sluice drive")).not.toHaveTextContent("over its limit");
    expect(rowNamed("Weir drive")).toHaveTextContent(/clips.*±3\.8.* over its limit of 0\.15 A/);
  });

  it("says that a scenario has not been run", () => {
    draw();
    expect(rowNamed("Pump")).toHaveTextContent("Not run yet. Run");
  });

  it("keeps what the person may not do in sight, with the reason, and does not do it", async () => {
    draw();
    const menu = within(await menuOf("Pump"));
    const archive = menu.getByRole("menuitem", { name: /^Archive/ });
    expect(archive).toHaveAttribute("aria-disabled", "true");
    expect(archive).toHaveTextContent("Your role archives only what is its own.");
    await userEvent.click(archive);
    expect(actions.archiveScenario).not.toHaveBeenCalled();
  });

  it("archives without a question and takes it back on Undo", async () => {
    actions.archiveScenario.mockResolvedValue(success(null));
    actions.restoreScenario.mockResolvedValue(success(null));
    draw();
    await userEvent.click(within(await menuOf("Weir drive")).getByRole("menuitem", { name: "Archive" }));
    expect(actions.archiveScenario).toHaveBeenCalledExactlyOnceWith({ scenarioId: "b" });
    expect(await screen.findByText("Archived “Weir drive”")).toBeVisible();
    await userEvent.click(screen.getByRole("button", { name: "Undo" }));
    expect(actions.restoreScenario).toHaveBeenCalledExactlyOnceWith({ scenarioId: "b" });
    expect(router.refresh).toHaveBeenCalledTimes(2);
  });

  it("exports its document as a file", async () => {
    const document = shortDocument();
    actions.readDocument.mockResolvedValue(success(document));
    const blobs: Blob[] = [];
    vi.stubGlobal("URL", Object.assign(URL, { createObjectURL: (blob: Blob) => (blobs.push(blob), "blob:x"), revokeObjectURL: () => undefined }));
    const names: string[] = [];
    vi.spyOn(HTMLAnchorElement.prototype, "click").mockImplementation(function (this: HTMLAnchorElement) {
      names.push(this.download);
    });
    draw();
    await userEvent.click(within(await menuOf("Sluice drive")).getByRole("menuitem", { name: "Export" }));
    await waitFor(() => expect(names).toEqual(["sluice-drive.json"]));
    expect(JSON.parse(await blobs[0]!.text())).toEqual(document);
    vi.restoreAllMocks();
  });

  it("says why a copy could not be made, the network included", async () => {
    actions.duplicateScenario.mockRejectedValue(new Error("offline"));
    draw();
    await userEvent.click(within(await menuOf("Sluice drive")).getByRole("menuitem", { name: "Duplicate" }));
    expect(await screen.findByText(/The server cannot be reached/)).toBeVisible();
    expect(router.push).not.toHaveBeenCalled();
  });
});

describe("the keys of the list", () => {
  it("move the focus from row to row and act on the row", async () => {
    actions.duplicateScenario.mockResolvedValue(success({ id: "new" }));
    draw();
    await userEvent.keyboard("j");
    expect(screen.getByRole("link", { name: "Sluice drive" })).toHaveFocus();
    await userEvent.keyboard("j");
    expect(screen.getByRole("link", { name: "Weir drive" })).toHaveFocus();
    expect(rowNamed("Weir drive")).toHaveAttribute("aria-current", "true");
    await userEvent.keyboard("jjk");
    expect(screen.getByRole("link", { name: "Weir drive" })).toHaveFocus();
    await userEvent.keyboard("d");
    expect(actions.duplicateScenario).toHaveBeenCalledExactlyOnceWith({ scenarioId: "b" });
    await waitFor(() => expect(router.push).toHaveBeenCalledExactlyOnceWith("/scenarios/new"));
  });

  it("write letters while the person types", async () => {
    draw();
    await userEvent.keyboard("/");
    expect(screen.getByRole("searchbox")).toHaveFocus();
    await userEvent.keyboard("dejn");
    expect(screen.getByRole("searchbox")).toHaveValue("dejn");
    expect(actions.duplicateScenario).not.toHaveBeenCalled();
  });

  it("can be switched off, which the browser remembers", async () => {
    const { unmount } = draw();
    await userEvent.click(screen.getByRole("button", { name: "Letter keys on" }));
    unmount();
    draw();
    await userEvent.keyboard("n");
    expect(screen.queryByRole("dialog")).toBeNull();
    await userEvent.click(screen.getByRole("button", { name: "Letter keys off" }));
    await userEvent.keyboard("n");
    expect(await screen.findByRole("dialog", { name: "New scenario" })).toBeVisible();
  });
});

describe("a new scenario", () => {
  it("starts from the chosen template under the name given, or the template's own", async () => {
    actions.createScenario.mockResolvedValue(success({ id: "n1" }));
    draw();
    await userEvent.click(screen.getByRole("button", { name: "New scenario" }));
    await userEvent.type(await screen.findByLabelText("Name"), " Mill race ");
    await userEvent.click(screen.getByRole("button", { name: "Make the scenario" }));
    expect(actions.createScenario).toHaveBeenCalledExactlyOnceWith({ templateId: "t1", title: "Mill race" });
    expect(router.push).toHaveBeenCalledExactlyOnceWith("/scenarios/n1");
  });

  it("starts from scratch with a document that the server can take", async () => {
    actions.createScenario.mockResolvedValue(failure("limit.reached"));
    draw();
    await userEvent.click(screen.getByRole("button", { name: "New scenario" }));
    await userEvent.click(await screen.findByRole("radio", { name: /From scratch/ }));
    await userEvent.click(screen.getByRole("button", { name: "Make the scenario" }));
    const [sent] = actions.createScenario.mock.calls[0]!;
    expect(sent).toMatchObject({ title: "New scenario", document: { format: "slackwater.scenario/1" } });
    expect(await screen.findByRole("alert")).toBeVisible();
    expect(router.push).not.toHaveBeenCalled();
  });

  it("is in sight but barred, with the reason, for a role that makes none", async () => {
    draw({ mayCreate: false, role: "student" });
    const button = screen.getByRole("button", { name: "New scenario" });
    expect(button).toHaveAttribute("aria-disabled", "true");
    await userEvent.click(button);
    expect(screen.queryByRole("dialog")).toBeNull();
  });
});
