import { Link } from "react-router-dom";
import type { WaitingItem } from "#src/routes/floor-waiting.ts";

const LINK = "underline decoration-rule underline-offset-4 hover:decoration-ink";

/** The step first, then what it is about, then why. */
export function WaitingList({ items }: { items: readonly WaitingItem[] }) {
  return (
    <ul className="border-t border-ink">
      {items.map(({ key, what, why, act, href }) => (
        <li
          key={key}
          className="grid grid-cols-[7rem_minmax(0,1fr)] items-baseline gap-x-6 border-b border-hair py-1.5 lg:grid-cols-[7rem_minmax(0,2fr)_minmax(0,3fr)]"
        >
          <Link to={href} className={`${LINK} py-1`}>
            {act}
            <span className="sr-only">: {what}</span>
          </Link>
          <span className="font-semibold wrap-anywhere">{what}</span>
          <span className="text-soft max-lg:col-start-2">{why}</span>
        </li>
      ))}
    </ul>
  );
}
