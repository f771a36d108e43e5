import { render, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { describe, expect, it, vi } from "vitest";
import { ShareButton } from "@/components/share/share-button";
import { ShareDialog } from "@/components/share/share-dialog";
import { expiryIn } from "@/components/share/expiry";
import type { LinkDraft } from "@/components/share/make-link";
import type { ShareActions } from "@/components/share/share-actions";
import type { ShareLinkView } from "@/db/queries/shares";
import { failure, success } from "@/lib/result";
import { renderScenario } from "../scenario/support";

const SCENARIO = "11111111-1111-4111-8111-111111111111";
const URL_MADE = "https://slackwater.example.org/s/qT7";

const linkOf = (change: Partial<ShareLinkView> = {}): ShareLinkView => ({
  id: "33333333-3333-4333-8333-333333333333",
  label: "Night shift",
  follows: "pinned",
  revisionNumber: 4,
  makerName: "Odile Frammer",
  createdAt: new Date(2026, 4, 2, 9, 15),
  expiresAt: new Date(2026, 5, 11, 23, 59),
  revokedAt: null,
  status: "open",
  openedCount: 3,
  lastOpenedAt: new Date(2026, 4, 8, 16, 40),
  mayChange: true,
  mayRevoke: true,
  ...change,
});

/** A server of one scenario, in memory: what was made and revoked is listed. */
function serverOf(links: ShareLinkView[]) {
  const held = [...links];
  return {
    createShareLink: vi.fn<ShareActions["createShareLink"]>(async ({ label, follows, revisionNumber, expiresAt }) => {
      held.unshift(linkOf({ id: `made-${held.length}`, label, follows, revisionNumber: revisionNumber ?? null, expiresAt: expiresAt ?? null, openedCount: 0, lastOpenedAt: null }));
      return success({ id: `made-${held.length}`, url: URL_MADE });
    }),
    listShareLinks: vi.fn<ShareActions["listShareLinks"]>(async () => success([...held])),
    revokeShareLink: vi.fn<ShareActions["revokeShareLink"]>(async ({ linkId }) => {
      const at = held.findIndex((one) => one.id === linkId);
      held[at] = { ...held[at]!, status: "revoked", revokedAt: new Date(2026, 4, 9, 8, 0), mayRevoke: false, mayChange: false };
      return success(null);
    }),
    changeExpiry: vi.fn<ShareActions["changeExpiry"]>(async ({ linkId, expiresAt }) => {
      const at = held.findIndex((one) => one.id === linkId);
      held[at] = { ...held[at]!, expiresAt };
      return success({ expiresAt });
    }),
  };
}

function Opened({ actions }: { actions: ShareActions }) {
  const [draft, setDraft] = useState<LinkDraft>({ label: "", follows: "pinned", expiry: expiryIn("none") });
  return <ShareDialog scenarioId={SCENARIO} revisionNumber={7} draft={draft} onDraft={setDraft} actions={actions} onClose={() => undefined} />;
}
const labelField = () => screen.getByRole<HTMLInputElement>("textbox", { name: /^Label/ });
const makeIt = () => screen.getByRole("button", { name: "Make the link" });
const row = (name: string) => screen.findByRole("listitem", { name });

describe("the share dialog", () => {
  it("makes a link pinned to the revision, shows it with the warning that it is shown once, and lists it", async () => {
    const actions = serverOf([]);
    const user = userEvent.setup();
    render(<Opened actions={actions} />);
    expect(await screen.findByText("No link has been made yet.")).toBeInTheDocument();
    await user.type(labelField(), "Pump room");
    await user.click(makeIt());
    expect(actions.createShareLink).toHaveBeenCalledExactlyOnceWith({ scenarioId: SCENARIO, label: "Pump room", follows: "pinned", revisionNumber: 7, expiresAt: null });
    expect(await screen.findByRole("textbox", { name: "Link" })).toHaveValue(URL_MADE);
    expect(screen.getByRole("region", { name: "New link" })).toHaveTextContent("shown only once");
    expect(await row("Pump room")).toHaveTextContent("rev 7, pinned");
    await user.click(screen.getByRole("button", { name: "Copy the link" }));
    expect(await navigator.clipboard.readText()).toBe(URL_MADE);
    expect(await screen.findByText("Copied.")).toBeInTheDocument();
  });

  it("selects the link and says so where the browser does not let the page copy", async () => {
    const user = userEvent.setup();
    vi.spyOn(navigator.clipboard, "writeText").mockRejectedValue(new Error("not allowed"));
    render(<Opened actions={serverOf([])} />);
    await user.type(labelField(), "Pump room");
    await user.click(makeIt());
    await user.click(await screen.findByRole("button", { name: "Copy the link" }));
    expect(await screen.findByText(/does not let the page copy/)).toBeInTheDocument();
    const field = screen.getByRole<HTMLInputElement>("textbox", { name: "Link" });
    expect([field.selectionStart, field.selectionEnd]).toEqual([0, URL_MADE.length]);
  });

  it("makes a link that follows the newest revision and lasts to the end of the day chosen", async () => {
    const actions = serverOf([]);
    const user = userEvent.setup();
    render(<Opened actions={actions} />);
    await user.type(labelField(), "Class of June");
    await user.click(screen.getByRole("radio", { name: "Always the newest revision" }));
    await user.selectOptions(screen.getByRole("combobox", { name: "Ends" }), "On a date");
    await user.click(makeIt());
    expect(screen.getByRole("alert")).toHaveTextContent("Enter the last day");
    expect(actions.createShareLink).not.toHaveBeenCalled();
    await user.type(screen.getByLabelText("Last day"), "2199-03-17");
    await user.click(makeIt());
    expect(actions.createShareLink).toHaveBeenCalledExactlyOnceWith({ scenarioId: SCENARIO, label: "Class of June", follows: "newest", expiresAt: new Date(2199, 2, 17, 23, 59, 59) });
  });

  it("asks for a label before it asks the server", async () => {
    const actions = serverOf([]);
    render(<Opened actions={actions} />);
    await userEvent.click(makeIt());
    expect(labelField()).toHaveAccessibleDescription("Say who or what the link is for.");
    expect(actions.createShareLink).not.toHaveBeenCalled();
  });

  it("puts the server's refusal at its field and keeps what was typed", async () => {
    const text = "A label has 1 to 80 characters.";
    const actions = serverOf([]);
    actions.createShareLink.mockResolvedValueOnce(failure("input.invalid", { findings: [{ path: "label", code: "input.invalid", text }] }));
    const user = userEvent.setup();
    render(<Opened actions={actions} />);
    await user.type(labelField(), "Pump room");
    await user.selectOptions(screen.getByRole("combobox", { name: "Ends" }), "In 7 days");
    await user.click(makeIt());
    await waitFor(() => expect(labelField()).toHaveAccessibleDescription(text));
    expect(labelField()).toHaveValue("Pump room");
    expect(screen.getByRole("combobox", { name: "Ends" })).toHaveValue("7");
    expect(screen.queryByRole("region", { name: "New link" })).toBeNull();
  });

  it("keeps what was typed when the server cannot be reached", async () => {
    vi.spyOn(console, "warn").mockImplementation(() => undefined);
    const user = userEvent.setup();
    const actions = serverOf([]);
    actions.createShareLink.mockRejectedValueOnce(new Error("offline"));
    render(<Opened actions={actions} />);
    await user.type(labelField(), "Pump room");
    await user.click(makeIt());
    expect(await screen.findByRole("alert")).toHaveTextContent("The server cannot be reached.");
    expect(labelField()).toHaveValue("Pump room");
  });

  it("lists who made a link, how often and when it was opened, when it ends and how it stands", async () => {
    const links = [linkOf(), linkOf({ id: "b", label: "Old class", follows: "newest", revisionNumber: null, status: "expired", openedCount: 0, lastOpenedAt: null, mayChange: false, mayRevoke: false })];
    render(<Opened actions={serverOf(links)} />);
    const first = await row("Night shift");
    for (const words of ["Open", "rev 4, pinned", "by Odile Frammer", "Opened 3 times, last 8 May 2026, 16:40", "ends 11 Jun 2026, 23:59"]) expect(first).toHaveTextContent(words);
    const second = await row("Old class");
    for (const words of ["Expired", "newest", "Not opened yet", "ended 11 Jun 2026"]) expect(second).toHaveTextContent(words);
    expect(within(second).queryByRole("button")).toBeNull();
  });

  it("revokes only after one confirmation in place", async () => {
    const actions = serverOf([linkOf()]);
    const user = userEvent.setup();
    render(<Opened actions={actions} />);
    const first = await row("Night shift");
    await user.click(within(first).getByRole("button", { name: "Revoke" }));
    await user.click(within(first).getByRole("button", { name: "Keep it" }));
    expect(actions.revokeShareLink).not.toHaveBeenCalled();
    await user.click(within(first).getByRole("button", { name: "Revoke" }));
    await user.click(within(first).getByRole("button", { name: "Revoke the link" }));
    expect(actions.revokeShareLink).toHaveBeenCalledExactlyOnceWith({ linkId: linkOf().id });
    await waitFor(async () => expect(await row("Night shift")).toHaveTextContent("Revoked"));
    expect(within(await row("Night shift")).queryByRole("button")).toBeNull();
  });

  it("changes when a link ends, and keeps the choice when that is refused", async () => {
    const actions = serverOf([linkOf()]);
    actions.changeExpiry.mockResolvedValueOnce(failure("link.revoked"));
    const user = userEvent.setup();
    render(<Opened actions={actions} />);
    const first = await row("Night shift");
    await user.click(within(first).getByRole("button", { name: "Change expiry" }));
    await user.selectOptions(within(first).getByRole("combobox", { name: "New end" }), "Never");
    await user.click(within(first).getByRole("button", { name: "Change the end" }));
    expect(await within(first).findByRole("alert")).toHaveTextContent("This link was withdrawn");
    expect(within(first).getByRole("combobox", { name: "New end" })).toHaveValue("none");
    await user.click(within(first).getByRole("button", { name: "Change the end" }));
    expect(actions.changeExpiry).toHaveBeenLastCalledWith({ linkId: linkOf().id, expiresAt: null });
    await waitFor(async () => expect(await row("Night shift")).toHaveTextContent("no expiry"));
  });

  it("says why the links are not there and loads them again", async () => {
    const actions = serverOf([linkOf()]);
    actions.listShareLinks.mockResolvedValueOnce(failure("server.failed"));
    render(<Opened actions={actions} />);
    expect(await screen.findByRole("alert")).toHaveTextContent("Something broke on our side");
    await userEvent.click(screen.getByRole("button", { name: "Load the links again" }));
    expect(await row("Night shift")).toBeInTheDocument();
    expect(screen.queryByRole("alert")).toBeNull();
  });
});

describe("the share button", () => {
  it("stays in sight with its reason for a role that does not share", async () => {
    renderScenario(<ShareButton scenarioId={SCENARIO} mayShare={false} actions={serverOf([])} />);
    const button = screen.getByRole("button", { name: "Share" });
    expect(button).toHaveAttribute("aria-disabled", "true");
    expect(button).toHaveAccessibleDescription("Your role in this workspace does not share scenarios.");
    await userEvent.click(button);
    expect(screen.queryByRole("dialog")).toBeNull();
  });

  it("opens the dialog with the newest saved revision and keeps a label that was not sent", async () => {
    const user = userEvent.setup();
    renderScenario(<ShareButton scenarioId={SCENARIO} mayShare actions={serverOf([])} />);
    await user.click(screen.getByRole("button", { name: "Share" }));
    expect(screen.getByRole("radio", { name: "Revision 7, pinned" })).toBeChecked();
    await user.type(labelField(), "Pump");
    await user.keyboard("{Escape}");
    expect(screen.queryByRole("dialog")).toBeNull();
    await user.click(screen.getByRole("button", { name: "Share" }));
    expect(labelField()).toHaveValue("Pump");
  });
});
