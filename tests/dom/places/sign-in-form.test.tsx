import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { beforeEach, describe, expect, it, vi } from "vitest";
import { SignInForm } from "@/components/shell/sign-in-form";
import { failure, success } from "@/lib/result";
import { router, WithRouter } from "../scenario/support";

type Props = Parameters<typeof SignInForm>[0];
const signIn = vi.fn<Props["signIn"]>();
const demo = { password: "low and high", accounts: [{ email: "lead@weir.example.org", role: "lead" as const, name: "Runa Tamsel" }] };
const open = (change: Partial<Props> = {}) =>
  render(
    <WithRouter>
      <SignInForm signIn={signIn} from="/workspace" demo={null} {...change} />
    </WithRouter>,
  );
const email = () => screen.getByLabelText(/^E-mail/);
const password = () => screen.getByLabelText(/^Password/);
const submit = () => userEvent.click(screen.getByRole("button", { name: "Sign in" }));

beforeEach(() => {
  signIn.mockReset();
  router.push.mockReset();
});

describe("the sign-in form", () => {
  it("says one sentence when refused and keeps both values", async () => {
    signIn.mockResolvedValue(failure("auth.refused"));
    open();
    await userEvent.type(email(), "runa@weir.example.org");
    await userEvent.type(password(), "ebb tide 9");
    await submit();
    expect(await screen.findByRole("alert")).toHaveTextContent("E-mail and password do not belong together.");
    expect(email()).toHaveValue("runa@weir.example.org");
    expect(password()).toHaveValue("ebb tide 9");
    expect(screen.getByRole("button", { name: "Sign in" })).toBeEnabled();
    expect(router.push).not.toHaveBeenCalled();
  });

  it("names the empty field and asks the server nothing", async () => {
    open();
    await userEvent.type(email(), "runa@weir.example.org");
    await submit();
    expect(password()).toHaveAccessibleDescription("Enter your password.");
    expect(email()).not.toHaveAttribute("aria-invalid");
    expect(signIn).not.toHaveBeenCalled();
  });

  it("keeps both values when the server cannot be reached", async () => {
    signIn.mockRejectedValue(new Error("offline"));
    open();
    await userEvent.type(email(), "runa@weir.example.org");
    await userEvent.type(password(), "ebb tide 9");
    await submit();
    expect(await screen.findByRole("alert")).toHaveTextContent("The server cannot be reached.");
    expect(password()).toHaveValue("ebb tide 9");
  });

  it("goes where the answer says, with the page the person came from", async () => {
    signIn.mockResolvedValue(success({ returnPath: "/workspace" }));
    open();
    await userEvent.type(email(), " runa@weir.example.org ");
    await userEvent.type(password(), "ebb tide 9");
    await submit();
    expect(signIn).toHaveBeenCalledExactlyOnceWith({ email: "runa@weir.example.org", password: "ebb tide 9", from: "/workspace" });
    expect(router.push).toHaveBeenCalledExactlyOnceWith("/workspace");
  });

  it("fills in a demo account and signs nobody in by itself", async () => {
    open({ demo });
    await userEvent.click(screen.getByRole("button", { name: "Lead" }));
    expect(email()).toHaveValue("lead@weir.example.org");
    expect(password()).toHaveValue("low and high");
    expect(signIn).not.toHaveBeenCalled();
  });

  it("offers no demo account where there is none", () => {
    open();
    expect(screen.queryByRole("region", { name: "Demo accounts" })).toBeNull();
  });
});
