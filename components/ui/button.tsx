import { useId, type ButtonHTMLAttributes } from "react";
import { Tip } from "./tip";

type Props = ButtonHTMLAttributes<HTMLButtonElement> & { kind?: "primary" | "secondary" | "quiet" | "danger"; size?: "large" };

/** A button; with `disabledReason` it stays reachable, does nothing and says why. */
export function Button({ kind = "secondary", size, disabledReason, onClick, ...rest }: Props & { disabledReason?: string }) {
  const reasonId = useId();
  const look = { type: "button" as const, ...rest, className: `button ${rest.className ?? ""}`, "data-kind": kind, "data-size": size };
  if (disabledReason === undefined) return <button {...look} onClick={onClick} />;
  return (
    <>
      <Tip words={disabledReason}>
        {/* a form is not sent by a button that is barred */}
        <button {...look} type="button" aria-disabled aria-describedby={reasonId} />
      </Tip>
      <span id={reasonId} hidden>
        {disabledReason}
      </span>
    </>
  );
}
