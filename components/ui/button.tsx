import type { ComponentProps } from "react";
import { type ButtonSize, type ButtonTone, buttonStyle } from "./button-style";

export type ButtonProps = Readonly<ComponentProps<"button"> & { tone?: ButtonTone; size?: ButtonSize; busy?: boolean }>;

/** `busy` keeps the button focusable and says so; clicks are ignored until it is over. */
export function Button({ tone, size, busy, className, type = "button", onClick, ...rest }: ButtonProps) {
  return (
    <button
      {...rest}
      type={busy ? "button" : type}
      aria-busy={busy || undefined}
      aria-disabled={busy || rest["aria-disabled"] || undefined}
      onClick={busy ? undefined : onClick}
      className={buttonStyle(tone, size, className)}
    />
  );
}
