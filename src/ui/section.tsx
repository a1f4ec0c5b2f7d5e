import { type ReactNode, useId } from "react";

interface SectionProps {
  title: string;
  /** stands under the title in the margin */
  note?: ReactNode;
  /** what one can do with the whole section */
  actions?: ReactNode;
  children: ReactNode;
}

/** One strip of a page: a rule above, its title in the margin where there is room for one, its contents beside. */
export function Section({ title, note, actions, children }: SectionProps) {
  const id = useId();
  return (
    <section aria-labelledby={id} className="@container border-t border-rule py-5">
      <div className="grid gap-x-8 gap-y-3 @4xl:grid-cols-[9.5rem_minmax(0,1fr)]">
        <div className="flex flex-wrap items-baseline gap-x-4 gap-y-2 @4xl:flex-col @4xl:items-start">
          <h2 id={id} className="text-base font-semibold">
            {title}
          </h2>
          {note && <div className="text-small text-soft">{note}</div>}
          {actions && <div className="flex flex-wrap gap-x-4 gap-y-2 @4xl:flex-col @4xl:items-start">{actions}</div>}
        </div>
        <div className="min-w-0">{children}</div>
      </div>
    </section>
  );
}

interface PageHeadProps {
  /** what kind of thing this page is about */
  kind?: string;
  title: ReactNode;
  note?: ReactNode;
  actions?: ReactNode;
}

export function PageHead({ kind, title, note, actions }: PageHeadProps) {
  return (
    <header className="flex flex-wrap items-end justify-between gap-x-8 gap-y-3 pt-7 pb-5">
      <div className="min-w-0">
        {kind && <p className="text-small text-soft">{kind}</p>}
        <h1 className="text-title font-semibold wrap-anywhere">{title}</h1>
        {note && <div className="text-small text-soft">{note}</div>}
      </div>
      {actions && <div className="flex flex-wrap items-end gap-3">{actions}</div>}
    </header>
  );
}
