import type { ComponentProps } from "react";
import { Link, type LinkProps } from "react-router-dom";
import { classNames } from "#src/ui/class-names.ts";

/** `main`: what the page is for, at most one in sight. `plain`: everything else. `quiet`: beside other things in a line. */
export type ButtonWeight = "main" | "plain" | "quiet";

const SHAPE =
  "inline-flex min-h-9 items-center justify-center gap-2 whitespace-nowrap rounded px-3.5 text-base select-none";
const WEIGHTS: Record<ButtonWeight, string> = {
  main: "border border-ink bg-ink font-semibold text-paper not-disabled:hover:bg-soft not-disabled:hover:border-soft",
  plain: "border border-rule bg-sheet text-ink not-disabled:hover:border-ink not-disabled:hover:bg-well",
  quiet: "min-h-7 px-0! underline decoration-rule underline-offset-4 not-disabled:hover:decoration-ink",
};
const OFF =
  "disabled:border-dashed disabled:border-rule disabled:bg-transparent disabled:text-soft disabled:no-underline";

interface Look {
  weight?: ButtonWeight;
}

export function Button({ weight = "plain", className, type = "button", ...rest }: ComponentProps<"button"> & Look) {
  return <button type={type} className={classNames(SHAPE, WEIGHTS[weight], OFF, className)} {...rest} />;
}

/** Looks like a button, goes to a page. */
export function ButtonLink({ weight = "plain", className, ...rest }: LinkProps & Look) {
  return <Link className={classNames(SHAPE, WEIGHTS[weight], className)} {...rest} />;
}

/** Looks like a button, fetches a file. */
export function FileLink({ weight = "plain", className, children, ...rest }: ComponentProps<"a"> & Look) {
  return (
    <a className={classNames(SHAPE, WEIGHTS[weight], className)} {...rest}>
      {children}
    </a>
  );
}
