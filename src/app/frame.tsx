import { NavLink, Outlet, ScrollRestoration } from "react-router-dom";
import { KeysNote } from "#src/app/keys-note.tsx";
import { paths } from "#src/app/paths.ts";
import { PersonMenu } from "#src/app/person-menu.tsx";
import { SheetSwitch } from "#src/app/sheet-switch.tsx";
import { useHeadingFocus } from "#src/app/use-heading-focus.ts";
import { useSession } from "#src/features/auth/session-context.tsx";
import { useJobEvents } from "#src/features/jobs/use-job-events.ts";
import { useOnline } from "#src/lib/use-online.ts";

const PAGES = [
  { to: paths.floor, name: "Floor", end: true },
  { to: paths.documents("profiles"), name: "Profiles" },
  { to: paths.documents("machines"), name: "Machines" },
  { to: paths.documents("polymers"), name: "Polymers" },
  { to: paths.members, name: "Members" },
];

/** What surrounds every page: one strip along the top, the page under it. */
export function Frame() {
  useJobEvents();
  const page = useHeadingFocus();
  const { team } = useSession();
  const online = useOnline();
  return (
    <div className="flex min-h-dvh flex-col">
      <a
        href="#page"
        className="sr-only focus:not-sr-only focus:absolute focus:z-10 focus:bg-ink focus:px-3 focus:py-2 focus:text-paper"
      >
        Skip to the page
      </a>
      <header className="border-b border-ink">
        <div className="mx-auto flex max-w-[100rem] flex-wrap items-stretch gap-x-3 px-5 lg:gap-x-5 xl:gap-x-8">
          <Wordmark />
          <nav aria-label="Pages" className="flex flex-wrap">
            {PAGES.map(({ to, name, end }) => (
              <NavLink
                key={to}
                to={to}
                end={end}
                className="-mb-px inline-flex min-h-11 items-center border-b-3 border-transparent px-2.5 hover:bg-well lg:px-3 aria-[current=page]:border-ink aria-[current=page]:font-semibold"
              >
                {name}
              </NavLink>
            ))}
          </nav>
          <div className="ml-auto flex items-center gap-x-4 xl:gap-x-5">
            <span className="hidden text-small text-soft xl:inline">{team.name}</span>
            <span className="max-lg:hidden">
              <SheetSwitch />
            </span>
            <KeysNote />
            <PersonMenu />
          </div>
        </div>
      </header>
      {!online && (
        <p role="status" className="bg-ink px-5 py-2 text-paper">
          No network. You can go on looking and typing; what needs the server works again when the network is back.
        </p>
      )}
      <main ref={page} id="page" tabIndex={-1} className="mx-auto w-full max-w-[100rem] grow px-5 pb-16 outline-none">
        <Outlet />
      </main>
      <ScrollRestoration />
    </div>
  );
}

/** The name with the line through it: Tg, and layers on either side. */
function Wordmark() {
  return (
    <NavLink
      to={paths.floor}
      className="flex items-center gap-2.5 py-2 font-semibold tracking-wide"
      aria-label="Quenchline, floor"
    >
      <svg aria-hidden width="26" height="24" viewBox="0 0 26 24" fill="none">
        <path d="M4 4h9M4 8h14M4 16h7M4 20h16" stroke="currentColor" strokeWidth="1.5" />
        <path d="M0 12h26" stroke="var(--amber)" strokeWidth="2" />
      </svg>
      Quenchline
    </NavLink>
  );
}
