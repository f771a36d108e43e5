import { fireEvent, render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { beforeEach, describe, expect, it, vi } from "vitest";
import { QuantityField } from "@/components/ui/quantity-field";
import { pageStepped, stepped } from "@/lib/scenario/sliders";
import { inputAt, type QuantityInput } from "@/lib/scenario/inputs";

const input = inputAt("sensing.shunt.resistanceOhm") as QuantityInput;
const taken = vi.fn();

function Field({ from = 0.01, min = input.min, max = input.max }: { from?: number; min?: number; max?: number }) {
  const [value, setValue] = useState(from);
  const [refused, setRefused] = useState<string | null>(null);
  return (
    <>
      <QuantityField
        label="Shunt value"
        value={value}
        shape={{ unit: "Ω", min, max }}
        refusedText={refused}
        onRefuse={setRefused}
        onTake={(next) => {
          taken(next);
          setValue(next);
        }}
        stepBy={(one, direction, size) => stepped(input, one, direction, size)}
        pageBy={(one, direction) => pageStepped(input, one, direction)}
      />
      <button type="button">elsewhere</button>
    </>
  );
}

const field = () => screen.getByRole<HTMLInputElement>("textbox", { name: "Shunt value" });
async function type(text: string) {
  const user = userEvent.setup();
  await user.click(field());
  await user.clear(field());
  await user.keyboard(text);
  return user;
}
beforeEach(() => taken.mockClear());

describe("the number field", () => {
  it("shows the value in engineering notation with its unit beside it", () => {
    render(<Field />);
    expect(field().value).toBe("10");
    expect(screen.getByText("mΩ")).toBeInTheDocument();
  });

  it.each([
    ["12m", 0.012],
    ["12 mΩ", 0.012],
    ["12 mohm", 0.012],
    ["12", 0.012],
    ["1.2e1 m", 0.012],
    ["0,5 Ω", 0.5],
    ["4700u", 0.0047],
  ])("takes %s by Enter", async (text, value) => {
    render(<Field />);
    const user = await type(text);
    await user.keyboard("{Enter}");
    expect(taken).toHaveBeenLastCalledWith(value);
    expect(document.activeElement).toBe(field());
  });

  it("says while typing how it will read, and takes it by Tab", async () => {
    render(<Field />);
    const user = await type("12");
    expect(screen.getByText("Will read as 12 mΩ.")).toBeInTheDocument();
    expect(taken).not.toHaveBeenCalled();
    await user.tab();
    expect(taken).toHaveBeenCalledExactlyOnceWith(0.012);
    expect(document.activeElement).toBe(screen.getByRole("button"));
  });

  it("puts the old value back by Escape and takes nothing", async () => {
    render(<Field />);
    const user = await type("77");
    await user.keyboard("{Escape}");
    expect(field().value).toBe("10");
    await user.tab();
    expect(taken).not.toHaveBeenCalled();
  });

  it("keeps what is out of range in the field, with the range and what the run keeps", async () => {
    render(<Field />);
    const user = await type("90 Ω");
    await user.tab();
    expect(taken).not.toHaveBeenCalled();
    expect(field().value).toBe("90 Ω");
    expect(field()).toHaveAttribute("aria-invalid", "true");
    expect(screen.getByRole("alert")).toHaveTextContent("90 Ω is outside 1 µΩ to 10 Ω. The run keeps 10 mΩ.");
    await user.click(field());
    await user.keyboard("{Escape}");
    expect(field().value).toBe("10");
    expect(screen.queryByRole("alert")).toBeNull();
  });

  it("keeps what is no number, and says so", async () => {
    render(<Field />);
    const user = await type("ten");
    await user.tab();
    expect(field().value).toBe("ten");
    expect(screen.getByRole("alert")).toHaveTextContent(/no number.*The run keeps 10 mΩ/);
  });

  it("reads a bare number in the base unit where only that fits, and says so", async () => {
    render(<Field max={0.5} min={0.005} />);
    await type("0.012");
    expect(screen.getByText(/Will read as 12 mΩ\. Read in Ω/)).toBeInTheDocument();
  });

  it.each([
    ["{ArrowUp}", 0.011],
    ["{ArrowDown}", 0.009],
    ["{Shift>}{ArrowUp}{/Shift}", 0.02],
    ["{Alt>}{ArrowUp}{/Alt}", 0.0101],
    ["{PageUp}", 0.011],
    ["{PageDown}", 0.0091],
  ])("steps by %s", async (keys, value) => {
    render(<Field />);
    const user = userEvent.setup();
    await user.click(field());
    await user.keyboard(keys);
    expect(taken.mock.lastCall?.[0]).toBeCloseTo(value, 9);
  });

  it("steps from what was typed and not yet taken", async () => {
    render(<Field />);
    const user = await type("20");
    await user.keyboard("{ArrowUp}");
    expect(taken).toHaveBeenLastCalledWith(0.021);
  });

  it("takes a value once, though Enter is followed by leaving the field", async () => {
    render(<Field />);
    const user = await type("15");
    await user.keyboard("{Enter}");
    fireEvent.blur(field());
    expect(taken).toHaveBeenCalledTimes(1);
  });
});
