import { useQuery } from "@tanstack/react-query";
import { useParams, useSearchParams } from "react-router-dom";
import { paths } from "#src/app/paths.ts";
import { DifferenceTable } from "#src/features/documents/difference-table.tsx";
import { type DocumentKind, historyQuery, versionQuery } from "#src/features/documents/kinds.ts";
import { usePageTitle } from "#src/lib/use-page-title.ts";
import { ButtonLink } from "#src/ui/button.tsx";
import { SelectField } from "#src/ui/field.tsx";
import { PageHead } from "#src/ui/section.tsx";
import { Loaded } from "#src/ui/states.tsx";

/** Two versions of a document, place by place. */
export function CompareVersions<D extends { name: string }>({ kind }: { kind: DocumentKind<D> }) {
  const { id = "" } = useParams();
  const [search, setSearch] = useSearchParams();
  const history = useQuery(historyQuery(kind, id));
  const [from, to] = [Number(search.get("from")) || 1, Number(search.get("to")) || 1];
  const before = useQuery(versionQuery(kind, id, from));
  const after = useQuery(versionQuery(kind, id, to));
  usePageTitle(`${history.data?.name ?? kind.noun}, versions ${from} and ${to}`);
  const choose = (side: "from" | "to", number: string) => {
    const next = new URLSearchParams(search);
    next.set(side, number);
    setSearch(next, { replace: true });
  };
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
          <Loaded query={before} what={`Fetching version ${from}`}>
            {(left) => (
              <Loaded query={after} what={`Fetching version ${to}`}>
                {(right) => (
                  <DifferenceTable
                    before={{ name: `Version ${from}`, document: left.document }}
                    after={{ name: `Version ${to}`, document: right.document }}
                  />
                )}
              </Loaded>
            )}
          </Loaded>
        </>
      )}
    </Loaded>
  );
}
