import { useQuery } from "@tanstack/react-query";
import { Navigate, useLocation, useNavigate } from "react-router-dom";
import { paths } from "#src/app/paths.ts";
import { sessionQuery } from "#src/features/auth/queries.ts";
import { SignInForm } from "#src/features/auth/sign-in-form.tsx";
import { usePageTitle } from "#src/lib/use-page-title.ts";

export function SignIn() {
  usePageTitle("Sign in");
  const navigate = useNavigate();
  const { state } = useLocation();
  const { data: session } = useQuery(sessionQuery);
  const to = (state as { to?: string } | null)?.to ?? paths.floor;
  if (session) return <Navigate to={to} replace />;
  return (
    <main className="mx-auto grid min-h-dvh max-w-4xl content-start gap-x-16 gap-y-10 px-5 py-10 md:pt-[20vh] md:grid-cols-[1fr_22rem]">
      <div>
        <Strip />
        <h1 className="mt-6 text-title font-semibold">Quenchline</h1>
        <p className="mt-2 max-w-sm text-soft">
          Heating and cooling, layer by layer: every layer solid in shape, and on the chosen side of the glass
          transition.
        </p>
      </div>
      <div className="border-t border-ink pt-5">
        <h2 className="mb-4 text-lead font-semibold">Sign in</h2>
        <SignInForm onSignedIn={() => navigate(to, { replace: true })} />
        <p className="mt-6 text-small text-soft">No account yet, or the password is lost: ask the lead of your team.</p>
      </div>
    </main>
  );
}

/** A few layers of a log and the line through them. */
function Strip() {
  const lengths = [34, 34, 33, 31, 28, 24, 19, 15, 13, 12, 12, 12];
  return (
    <svg aria-hidden viewBox="0 0 240 112" className="w-full max-w-sm">
      <defs>
        <pattern id="undecided" width="6" height="6" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <rect width="6" height="6" fill="var(--bone)" />
          <path d="M0 0v6" stroke="var(--amber)" strokeWidth="3" />
        </pattern>
      </defs>
      {lengths.map((length, layer) => (
        <rect
          // biome-ignore lint/suspicious/noArrayIndexKey: the layers of a drawing never move
          key={layer}
          x={60 - length}
          y={102 - layer * 8}
          width={length * 2}
          height={7}
          fill={layer < 5 ? "var(--bone)" : layer < 7 ? "url(#undecided)" : "var(--amber)"}
          stroke="var(--bone-edge)"
          strokeWidth="0.75"
        />
      ))}
      <path d="M120 6v103M236 6v103" stroke="var(--hair)" />
      <path d="M178 6v103" stroke="var(--ink)" strokeDasharray="5 3" />
      <path d="M206 109v-40c0-6-2-9-14-12s-28-4-34-12-4-22-6-39" fill="none" stroke="var(--heat)" strokeWidth="1.75" />
    </svg>
  );
}
