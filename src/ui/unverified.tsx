import type { ReactNode } from "react";

/** A number that nobody has checked: a mark and the word before it, where there is room, and a broken line under it. */
export function Unverified({ children, word = true }: { children: ReactNode; word?: boolean }) {
  return (
    <span className="whitespace-nowrap">
      <span className={word ? "pr-1 font-text text-fine text-soft" : "sr-only"}>unverified</span>
      <span aria-hidden className="pr-1 font-mono font-bold text-soft">
        ?
      </span>
      <span className="border-b border-dashed border-ink text-soft italic">{children}</span>
    </span>
  );
}
