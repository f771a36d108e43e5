import { fireEvent, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { beforeEach, describe, expect, it, vi } from "vitest";
import { ImportScenario } from "@/components/list/import-scenario";
import type { ListActions } from "@/components/list/list-actions";
import { failure, success } from "@/lib/result";
import { router, shortDocument, WithRouter } from "../scenario/support";

const createScenario = vi.fn<ListActions["createScenario"]>();
const open = () =>
  render(
    <WithRouter>
      <ImportScenario createScenario={createScenario} onClose={() => undefined} />
    </WithRouter>,
  );
const field = () => screen.getByRole<HTMLTextAreaElement>("textbox", { name: "Document" });
const paste = (text: string) => fireEvent.change(field(), { target: { value: text } });
const take = () => userEvent.click(screen.getByRole("button", { name: "Import the scenario" }));

beforeEach(() => {
  createScenario.mockReset();
  router.push.mockReset();
});

describe("the import of a scenario", () => {
  it("lists every refused value with its path and keeps the text", async () => {
    open();
    const text = JSON.stringify({ ...shortDocument(), supply: { ...shortDocument().supply, voltageV: -3 }, run: { durationS: 9e9 } });
    paste(text);
    await take();
    const alert = await screen.findByRole("alert");
    const items = within(alert).getAllByRole("listitem");
    expect(alert).toHaveTextContent(`${items.length} values cannot be taken`);
    expect(items.some((item) => item.textContent?.startsWith("supply.voltageV"))).toBe(true);
    expect(items.some((item) => item.textContent?.startsWith("run.durationS"))).toBe(true);
    expect(field()).toHaveValue(text);
    expect(createScenario).not.toHaveBeenCalled();
  });

  it("says that a text is not JSON and keeps it", async () => {
    open();
    paste('{ "title": ');
    await take();
    expect(await screen.findByRole("alert")).toHaveTextContent("This is not valid JSON");
    expect(field()).toHaveValue('{ "title": ');
  });

  it("makes the scenario of an exported document and goes there", async () => {
    createScenario.mockResolvedValue(success({ id: "a1b2" }));
    open();
    paste(JSON.stringify(shortDocument()));
    await take();
    expect(createScenario).toHaveBeenCalledExactlyOnceWith({ document: shortDocument(), title: "Sluice gate, reversal" });
    expect(router.push).toHaveBeenCalledExactlyOnceWith("/scenarios/a1b2");
  });

  it("shows the server's refusal, keeps the text and lets the person try again", async () => {
    createScenario.mockResolvedValue(failure("access.denied"));
    open();
    const text = JSON.stringify(shortDocument());
    paste(text);
    await take();
    expect(await screen.findByRole("alert")).toHaveTextContent("Your role in this workspace does not include this.");
    expect(field()).toHaveValue(text);
    expect(screen.getByRole("button", { name: "Import the scenario" })).toBeEnabled();
    expect(router.push).not.toHaveBeenCalled();
  });
});
