import { useQuery } from "@tanstack/react-query";
import { useParams, useSearchParams } from "react-router-dom";
import { paths } from "#src/app/paths.ts";
import { useMay } from "#src/features/auth/session-context.tsx";
import { DifferenceTable } from "#src/features/documents/difference-table.tsx";
import { type DocumentKind, historyQuery, versionQuery } from "#src/features/documents/kinds.ts";
import { VersionFacts } from "#src/features/documents/version-facts.tsx";
import { asProblem } from "#src/lib/problem.ts";
import { usePageTitle } from "#src/lib/use-page-title.ts";
import { useApproval } from "#src/routes/use-approval.ts";
import { Button, ButtonLink } from "#src/ui/button.tsx";
import { SelectField } from "#src/ui/field.tsx";
import { ProblemNotice } from "#src/ui/notice.tsx";
import { PageHead, Section } from "#src/ui/section.tsx";
import { Loaded } from "#src/ui/states.tsx";

/** Two versions of a document, place by place, with what is needed to approve the later one. */
export function CompareVersions<D extends { name: string }>({ kind }: { kind: DocumentKind<D> }) {
  const { id = "" } = useParams();
  const [search, setSearch] = useSearchParams();
  const may = useMay();
  const history = useQuery(historyQuery(kind, id));
  const [from, to] = [Number(search.get("from")) || 1, Number(search.get("to")) || 1];
  const before = useQuery(versionQuery(kind, id, from));
  const after = useQuery(versionQuery(kind, id, to));
  const approve = useApproval(kind, id);
  usePageTitle(`${history.data?.name ?? kind.noun}, versions ${from} and ${to}`);
  const choose = (side: "from" | "to", number: string) => {
    const next = new URLSearchParams(search);
    next.set(side, number);
    setSearch(next, { replace: true });
  };
  const withApproval = kind.plural === "profiles";
  return (
    <Loaded query={history} what={`Looking for the ${kind.noun}`}>
      {({ name, versions }) => (
        <>
          <PageHead
            kind="Two versions"
            title={name}
            actions={
              <>
                {(["from", "to"] as const).map((side) => (
                  <SelectField
                    key={side}
                    label={side === "from" ? "Before" : "After"}
                    value={side === "from" ? from : to}
                    onChange={({ target }) => choose(side, target.value)}
                  >
                    {versions.map(({ number }) => (
                      <option key={number} value={number}>
                        Version {number}
                      </option>
                    ))}
                  </SelectField>
                ))}
                <ButtonLink to={paths.document(kind.plural, id)}>To the {kind.noun}</ButtonLink>
              </>
            }
          />
          <Section title="Versions">
            <div className="grid gap-x-10 gap-y-4 md:grid-cols-2">
              {[from, to].map((wanted, side) => {
                const head = versions.find(({ number }) => number === wanted);
                const approvable = withApproval && may("approve") && head !== undefined && !head.approvedAt;
                return (
                  head && (
                    // biome-ignore lint/suspicious/noArrayIndexKey: there are two sides, and they may show one version
                    <VersionFacts key={side} head={head} withApproval={withApproval}>
                      {approvable && (
                        <Button disabled={approve.isPending} onClick={() => approve.mutate(head.number)}>
                          Approve version {head.number}
                        </Button>
                      )}
                    </VersionFacts>
                  )
                );
              })}
            </div>
            {approve.error && <ProblemNotice problem={asProblem(approve.error)} />}
          </Section>
          <Section title="Differences">
            <Loaded query={before} what={`Fetching version ${from}`}>
              {(left) => (
                <Loaded query={after} what={`Fetching version ${to}`}>
                  {(right) => (
                    <DifferenceTable
                      before={{ name: `Version ${from}`, document: left.document }}
                      after={{ name: `Version ${to}`, document: right.document }}
                      whole={`The whole ${kind.noun}`}
                    />
                  )}
                </Loaded>
              )}
            </Loaded>
          </Section>
        </>
      )}
    </Loaded>
  );
}
