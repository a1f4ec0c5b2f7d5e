import { Fragment, useState } from "react";
import { Button } from "#src/ui/button.tsx";
import { Dialog } from "#src/ui/dialog.tsx";

const GROUPS: { where: string; keys: [keys: string, does: string][] }[] = [
  {
    where: "Layer log",
    keys: [
      ["↑ ↓", "pin the layer above or below"],
      ["Page ↑ ↓", "a tenth of what is shown at once"],
      ["Home End", "the lowest, the highest layer"],
      ["+ −", "zoom in, zoom out"],
      ["Shift with ↑ ↓", "mark a band of layers"],
      ["Enter", "show only the marked layers"],
      ["Esc", "one step back: band, zoom, pinned layer"],
    ],
  },
  {
    where: "Curve and zones",
    keys: [
      ["↑ ↓ ← →", "move the point or the border that has the focus"],
      ["Shift with an arrow", "ten steps at once"],
      ["Delete", "remove the point or the zone"],
    ],
  },
  {
    where: "Fields",
    keys: [
      ["↑ ↓", "change a number by a step, with Shift by ten"],
      ["Ctrl Z", "undo, in every editor"],
      ["Ctrl Shift Z", "redo"],
    ],
  },
  {
    where: "Everywhere",
    keys: [
      ["Tab", "to the next thing that can be operated"],
      ["Esc", "close a dialog"],
    ],
  },
];

/** What the keyboard does, from every page. */
export function KeysNote() {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button weight="quiet" aria-haspopup="dialog" onClick={() => setOpen(true)}>
        Keys
      </Button>
      {open && (
        <Dialog title="Keys" onClose={() => setOpen(false)}>
          {GROUPS.map(({ where, keys }) => (
            <section key={where} aria-label={where} className="pb-4 last:pb-0">
              <h3 className="border-b border-rule pb-1 font-semibold">{where}</h3>
              <dl className="grid grid-cols-[9rem_minmax(0,1fr)] gap-x-4">
                {keys.map(([name, does]) => (
                  <Fragment key={name}>
                    <dt className="py-1 font-mono text-small">{name}</dt>
                    <dd className="py-1">{does}</dd>
                  </Fragment>
                ))}
              </dl>
            </section>
          ))}
        </Dialog>
      )}
    </>
  );
}
