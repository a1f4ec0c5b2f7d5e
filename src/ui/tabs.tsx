import { type KeyboardEvent, type ReactNode, useId, useRef } from "react";

interface Props<Id extends string> {
  label: string;
  tabs: readonly { id: Id; name: ReactNode; panel: ReactNode }[];
  shown: Id;
  onShow(id: Id): void;
}

/** Several sheets in one place. Arrow keys go from one to the next. */
export function Tabs<Id extends string>({ label, tabs, shown, onShow }: Props<Id>) {
  const id = useId();
  const list = useRef<HTMLDivElement>(null);
  const onKeyDown = (event: KeyboardEvent) => {
    const step = { ArrowRight: 1, ArrowLeft: -1 }[event.key];
    if (step === undefined) return;
    event.preventDefault();
    const next = (tabs.findIndex((tab) => tab.id === shown) + step + tabs.length) % tabs.length;
    onShow(tabs[next].id);
    list.current?.querySelectorAll<HTMLButtonElement>("[role=tab]")[next]?.focus();
  };
  return (
    <div>
      <div ref={list} role="tablist" aria-label={label} className="flex border-b border-ink" onKeyDown={onKeyDown}>
        {tabs.map((tab) => (
          <button
            key={tab.id}
            type="button"
            role="tab"
            id={`${id}-${tab.id}`}
            aria-selected={tab.id === shown}
            aria-controls={`${id}-panel`}
            tabIndex={tab.id === shown ? 0 : -1}
            className="-mb-px min-h-10 border border-transparent px-4 hover:bg-well aria-selected:border-ink aria-selected:border-b-paper aria-selected:font-semibold"
            onClick={() => onShow(tab.id)}
          >
            {tab.name}
          </button>
        ))}
      </div>
      <div role="tabpanel" id={`${id}-panel`} aria-labelledby={`${id}-${shown}`} className="pt-4">
        {tabs.find((tab) => tab.id === shown)?.panel}
      </div>
    </div>
  );
}
