import { type ComponentProps, type ReactNode, useId } from "react";
import { classNames } from "#src/ui/class-names.ts";

interface Labelled {
  label: ReactNode;
  hint?: ReactNode;
  error?: string;
}

const BOX =
  "min-h-9 w-full rounded border border-rule bg-sheet px-2.5 text-ink placeholder:text-soft hover:border-ink disabled:border-dashed disabled:text-soft aria-invalid:border-2 aria-invalid:border-ink";

/** Label, hint and error around one control, which is told their ids. */
function Frame({
  label,
  hint,
  error,
  className,
  control,
}: Labelled & {
  className?: string;
  control(ids: { id: string; "aria-describedby"?: string; "aria-invalid"?: true }): ReactNode;
}) {
  const id = useId();
  const said = [hint !== undefined && `${id}-hint`, error !== undefined && `${id}-error`].filter(Boolean).join(" ");
  return (
    <div className={classNames("flex flex-col gap-1", className)}>
      <label htmlFor={id} className="text-small font-semibold">
        {label}
      </label>
      {control({ id, "aria-describedby": said || undefined, "aria-invalid": error === undefined ? undefined : true })}
      {hint !== undefined && (
        <p id={`${id}-hint`} className="text-small text-soft">
          {hint}
        </p>
      )}
      {error !== undefined && (
        <p id={`${id}-error`} className="border-l-2 border-ink pl-2 text-small font-semibold">
          {error}
        </p>
      )}
    </div>
  );
}

export function TextField({ label, hint, error, className, ...rest }: Labelled & ComponentProps<"input">) {
  return (
    <Frame {...{ label, hint, error, className }} control={(ids) => <input {...ids} className={BOX} {...rest} />} />
  );
}

export function TextArea({ label, hint, error, className, ...rest }: Labelled & ComponentProps<"textarea">) {
  return (
    <Frame
      {...{ label, hint, error, className }}
      control={(ids) => <textarea {...ids} className={classNames(BOX, "py-1.5")} rows={2} {...rest} />}
    />
  );
}

export function SelectField({ label, hint, error, className, children, ...rest }: Labelled & ComponentProps<"select">) {
  return (
    <Frame
      {...{ label, hint, error, className }}
      control={(ids) => (
        <select {...ids} className={BOX} {...rest}>
          {children}
        </select>
      )}
    />
  );
}

export function CheckField({
  label,
  className,
  ...rest
}: Omit<ComponentProps<"input">, "type"> & { label: ReactNode }) {
  return (
    <label className={classNames("flex items-start gap-3 py-1", className)}>
      <input type="checkbox" className="mt-0.5 size-5 shrink-0 accent-ink" {...rest} />
      <span>{label}</span>
    </label>
  );
}
