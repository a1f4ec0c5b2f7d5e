import { Link } from "react-router-dom";
import type { WaitingItem } from "#src/routes/floor-waiting.ts";

export function WaitingList({ items }: { items: readonly WaitingItem[] }) {
  return (
    <ul className="border-t border-ink">
      {items.map(({ key, what, why, act, href }) => (
        <li key={key} className="flex flex-wrap items-baseline gap-x-6 border-b border-hair py-2">
          <span className="font-semibold wrap-anywhere">{what}</span>
          <span className="min-w-60 grow basis-0 text-soft">{why}</span>
          <Link to={href} className="py-1 underline decoration-rule underline-offset-4 hover:decoration-ink">
            {act}
            <span className="sr-only">: {what}</span>
          </Link>
        </li>
      ))}
    </ul>
  );
}
