import { type ComponentProps, type KeyboardEvent, type ReactNode, useState } from "react";
import { classNames } from "#src/ui/class-names.ts";
import { TextField } from "#src/ui/field.tsx";

interface NumberInput {
  /** undefined where nothing is given; NaN where what was typed is no number */
  value: number | undefined | null;
  onChange(value: number | undefined): void;
  /** what the arrow keys add and take away */
  step?: number;
  /** at least so many decimals, so that points stand in line in a column */
  decimals?: number;
  /** a share 0-1, such as a duty: `65 %` is taken as 0.65 */
  share?: boolean;
}

const noNumber = (share: boolean): string =>
  share ? "is no number. Type a share such as 0.65, or 65 %" : "is no number. Type digits, with a point for decimals";

/** What is typed stays as typed while it means the value ("0." is on its way to 0.5); a value set from outside replaces it. */
function useNumberText({ value, onChange, step = 1, decimals = 0, share = false }: NumberInput) {
  const numberOf = share ? shareOf : plainNumber;
  const [text, setText] = useState(() => textOf(value, decimals));
  const shown = Object.is(numberOf(text), value ?? undefined) ? text : textOf(value, decimals);
  const give = (typed: string) => {
    setText(typed);
    onChange(numberOf(typed));
  };
  return {
    isNumber: !Number.isNaN(value ?? 0),
    input: {
      value: shown,
      inputMode: "decimal" as const,
      autoComplete: "off",
      // What is no number stays to be seen and corrected.
      onBlur: () => !Number.isNaN(value ?? 0) && setText(textOf(value, decimals)),
      onChange: ({ target }: { target: { value: string } }) => give(target.value),
      onKeyDown: (event: KeyboardEvent) => {
        const sign = event.key === "ArrowUp" ? 1 : event.key === "ArrowDown" ? -1 : 0;
        const number = numberOf(shown) ?? 0;
        if (sign === 0 || Number.isNaN(number)) return;
        event.preventDefault();
        give(textOf(Number((number + sign * step * (event.shiftKey ? 10 : 1)).toFixed(9))));
      },
    },
  };
}

function textOf(value: number | undefined | null, decimals = 0): string {
  if (value === undefined || value === null || Number.isNaN(value)) return "";
  const [text, padded] = [String(value), value.toFixed(decimals)];
  return Number(padded) === value ? padded : text;
}

function shareOf(text: string): number | undefined {
  const [, percent] = /^(.+?)\s*%$/.exec(text.trim()) ?? [];
  const number = plainNumber(percent ?? text);
  // 0.07 and not 0.07000000000000001
  return percent === undefined || number === undefined ? number : Number((number / 100).toFixed(9));
}

/** A decimal comma is taken for a point. */
function plainNumber(text: string): number | undefined {
  const plain = text.trim().replace(",", ".").replace("\u2212", "-");
  if (plain === "") return undefined;
  return /^[+-]?(\d+\.?\d*|\.\d+)$/.test(plain) ? Number(plain) : Number.NaN;
}

interface FieldProps extends NumberInput {
  label: string;
  unit?: string;
  hint?: ReactNode;
  /** what is wrong with it, as a predicate: `must be between 0 and 1, got 3` */
  problem?: string;
  className?: string;
  disabled?: boolean;
}

/** A labelled number with its unit, and what is wrong with it right below. */
export function NumberField({ label, unit, hint, problem, className, disabled, ...number }: FieldProps) {
  const share = unit === "0–1";
  const { input, isNumber } = useNumberText({ ...number, share });
  return (
    <TextField
      label={
        <>
          {label} {unit && <span className="font-mono font-normal text-soft">{unit}</span>}
        </>
      }
      hint={hint}
      error={problemText(label, isNumber ? problem : noNumber(share))}
      className={classNames("[&_input]:text-right [&_input]:font-mono", className)}
      disabled={disabled}
      {...input}
    />
  );
}

/** A number in a cell of a table, named for those who don't see its row and column. */
export function NumberCell({
  label,
  problem,
  className,
  ...rest
}: NumberInput & Omit<ComponentProps<"input">, keyof NumberInput> & { label: string; problem?: string }) {
  const { value, onChange, step, decimals, share, ...more } = rest;
  const { input, isNumber } = useNumberText({ value, onChange, step, decimals, share });
  return (
    <input
      aria-label={label}
      aria-invalid={problem !== undefined || !isNumber || undefined}
      className={classNames(
        "min-h-8 w-24 rounded border border-rule bg-sheet px-2 text-right font-mono text-small hover:border-ink aria-invalid:border-2 aria-invalid:border-ink",
        className,
      )}
      {...more}
      {...input}
    />
  );
}

/** `Duty` and `must be between 0 and 1, got 3` as a sentence. */
export function problemText(label: string, problem: string | undefined): string | undefined {
  if (problem === undefined) return undefined;
  return `${label} ${problem}${/[.?]$/.test(problem) ? "" : "."}`;
}
