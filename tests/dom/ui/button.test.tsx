import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { describe, expect, it, vi } from "vitest";
import { Button } from "@/components/ui/button";

describe("a barred button", () => {
  const draw = () => {
    const onClick = vi.fn();
    const onSubmit = vi.fn((event: { preventDefault: () => void }) => event.preventDefault());
    render(
      <form onSubmit={onSubmit}>
        <Button type="submit" disabledReason="Only a lead approves." onClick={onClick}>
          Approve
        </Button>
      </form>,
    );
    return { button: screen.getByRole("button", { name: "Approve" }), onClick, onSubmit };
  };

  it("is described by its reason, and shows it at once on focus until Esc", async () => {
    const { button } = draw();
    expect(button).toHaveAccessibleDescription("Only a lead approves.");
    expect(screen.queryByRole("tooltip")).toBeNull();
    await userEvent.tab();
    expect(button).toHaveFocus();
    expect(screen.getByRole("tooltip")).toHaveTextContent("Only a lead approves.");
    await userEvent.keyboard("{Escape}");
    expect(screen.queryByRole("tooltip")).toBeNull();
  });

  it("says its reason when it is pressed or tapped, and does nothing else", async () => {
    const { button, onClick, onSubmit } = draw();
    await userEvent.click(button);
    expect(screen.getByRole("tooltip")).toHaveTextContent("Only a lead approves.");
    expect(button).toHaveAttribute("aria-disabled", "true");
    expect(onClick).not.toHaveBeenCalled();
    expect(onSubmit).not.toHaveBeenCalled();
  });
});

describe("a button that may be used", () => {
  it("submits its form and has no reason", async () => {
    const onSubmit = vi.fn((event: { preventDefault: () => void }) => event.preventDefault());
    render(
      <form onSubmit={onSubmit}>
        <Button type="submit">Save</Button>
      </form>,
    );
    const button = screen.getByRole("button", { name: "Save" });
    await userEvent.click(button);
    expect(onSubmit).toHaveBeenCalledOnce();
    expect(button).not.toHaveAccessibleDescription();
    expect(button).not.toHaveAttribute("aria-disabled");
  });
});
