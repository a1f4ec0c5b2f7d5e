import { type ReactNode, useEffect, useId, useRef } from "react";
import { Button } from "#src/ui/button.tsx";
import { classNames } from "#src/ui/class-names.ts";

interface Props {
  title: string;
  /** leave out for a dialog that cannot simply be put away */
  onClose?(): void;
  wide?: boolean;
  children: ReactNode;
}

/** A modal dialog: the browser keeps the focus inside, gives it back afterwards and closes on Escape. */
export function Dialog({ title, onClose, wide = false, children }: Props) {
  const ref = useRef<HTMLDialogElement>(null);
  const id = useId();
  useEffect(() => {
    const dialog = ref.current;
    if (dialog && !dialog.open) {
      dialog.showModal();
      // The browser would begin at Close; whoever opens a form wants to fill it in.
      dialog.querySelector<HTMLElement>("form :is(input:not([readonly]), select, textarea)")?.focus();
    }
    return () => dialog?.close();
  }, []);
  return (
    <dialog
      ref={ref}
      aria-labelledby={id}
      onCancel={(event) => {
        event.preventDefault();
        onClose?.();
      }}
      className={classNames(
        "m-auto max-h-[calc(100dvh-2rem)] w-[calc(100vw-2rem)] border border-ink bg-paper p-0 text-ink",
        wide ? "max-w-4xl" : "max-w-lg",
      )}
    >
      <div className="flex items-baseline justify-between gap-4 border-b border-ink px-5 py-3">
        <h2 id={id} className="text-lead font-semibold">
          {title}
        </h2>
        {onClose && (
          <Button weight="quiet" onClick={onClose}>
            Close
          </Button>
        )}
      </div>
      <div className="px-5 py-4">{children}</div>
    </dialog>
  );
}

/** The row of buttons that ends a dialog or a form. */
export function Actions({ children }: { children: ReactNode }) {
  return <div className="mt-5 flex flex-wrap items-center gap-3">{children}</div>;
}
