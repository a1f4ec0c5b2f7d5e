import { type ReactNode, useEffect, useState } from "react";
import { asProblem } from "#src/lib/problem.ts";
import { Button } from "#src/ui/button.tsx";
import { ProblemNotice } from "#src/ui/notice.tsx";

/** Nothing flashes up for a wait that nobody notices. */
const PATIENCE_MS = 250;

export function Loading({ what = "Loading" }: { what?: string }) {
  const [late, setLate] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setLate(true), PATIENCE_MS);
    return () => clearTimeout(timer);
  }, []);
  return (
    <p role="status" className="py-6 text-soft">
      {late ? `${what} …` : ""}
    </p>
  );
}

/** Nothing there yet, and what to do about it. */
export function Empty({ children, actions }: { children: ReactNode; actions?: ReactNode }) {
  return (
    <div className="border border-dashed border-rule px-5 py-4">
      <div className="text-soft">{children}</div>
      {actions && <div className="mt-3 flex flex-wrap gap-3">{actions}</div>}
    </div>
  );
}

export function Failed({ error, retry }: { error: unknown; retry?(): void }) {
  return <ProblemNotice problem={asProblem(error)} actions={retry && <Button onClick={retry}>Try again</Button>} />;
}

/** What `useQuery` yields, as far as it is needed here. */
interface QueryState<Data> {
  data: Data | undefined;
  error: unknown;
  refetch(): unknown;
}

/** The three states of a query; what is shown stays shown while it is fetched anew or when that fails. */
export function Loaded<Data>({
  query,
  what,
  children,
}: {
  query: QueryState<Data>;
  what?: string;
  children(data: Data): ReactNode;
}) {
  if (query.data !== undefined) return <>{children(query.data)}</>;
  if (query.error) return <Failed error={query.error} retry={() => query.refetch()} />;
  return <Loading what={what} />;
}
