import type { ButtonHTMLAttributes } from "react";

type Props = ButtonHTMLAttributes<HTMLButtonElement> & { kind?: "primary" | "secondary" | "quiet" | "danger"; size?: "large" };

/** A button; with `disabledReason` it stays reachable and says why it does nothing. */
export function Button({ kind = "secondary", size, disabledReason, onClick, ...rest }: Props & { disabledReason?: string }) {
  const isBarred = disabledReason !== undefined;
  return (
    <button
      type="button"
      {...rest}
      className={`button ${rest.className ?? ""}`}
      data-kind={kind}
      data-size={size}
      aria-disabled={isBarred || undefined}
      title={disabledReason ?? rest.title}
      onClick={isBarred ? (event) => event.preventDefault() : onClick}
    />
  );
}
