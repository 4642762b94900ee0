import Link from "next/link";
import type { ComponentProps } from "react";
import { type ButtonSize, type ButtonTone, buttonStyle } from "./button-style";

type LinkButtonProps = Readonly<ComponentProps<typeof Link> & { tone?: ButtonTone; size?: ButtonSize }>;

/** A destination that looks like a button; acts are `Button`s. */
export function LinkButton({ tone, size, className, ...rest }: LinkButtonProps) {
  return <Link {...rest} className={buttonStyle(tone, size, className)} />;
}
