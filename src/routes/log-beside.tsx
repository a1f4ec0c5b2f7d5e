import type { ReactNode } from "react";

/** The layer log with the numbers of its pinned layer beside it; they stay in sight while one scrolls. */
export function LogBeside({ log, beside }: { log: ReactNode; beside: ReactNode }) {
  return (
    <div className="grid gap-x-6 gap-y-4 py-5 xl:grid-cols-[minmax(0,1fr)_17rem] 2xl:grid-cols-[minmax(0,1fr)_20rem]">
      <div className="min-w-0 self-start border border-rule xl:sticky xl:top-4">{log}</div>
      <div className="min-w-0 max-xl:columns-2 max-xl:[&>section>*]:break-inside-avoid max-xl:gap-x-8 xl:sticky xl:top-4 xl:self-start">
        {beside}
      </div>
    </div>
  );
}
