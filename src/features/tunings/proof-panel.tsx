import type { ProofDocument } from "#shared/formats/proof.ts";
import { bytes } from "#src/lib/format.ts";
import { Facts } from "#src/ui/facts.tsx";

/** What was verified of the tuned file: every check, whether it passed, and what was found. */
export function ProofPanel({ proof }: { proof: ProofDocument }) {
  const { checks, kept, removed, inserted, renumbered, input, output, engine, machine, profile } = proof;
  const failed = checks.filter(({ passed }) => !passed).length;
  return (
    <div className="flex flex-col gap-4">
      <p className="text-lead">
        {failed === 0
          ? `All ${checks.length} checks passed.`
          : `${failed} of ${checks.length} checks failed. This file must not be printed.`}
      </p>
      <Facts
        facts={[
          { label: "Lines kept", value: kept.lines },
          { label: "taken out", value: removed.lines },
          { label: "put in", value: inserted.lines },
          { label: "renumbered", value: renumbered.lines },
          { label: "Original", value: bytes(input.bytes) },
          { label: "Tuned", value: bytes(output.bytes) },
        ]}
      />
      <ul className="border-t border-ink">
        {checks.map(({ id, passed, detail }) => (
          <li
            key={id}
            className="grid grid-cols-[1.25rem_11rem_minmax(0,1fr)] gap-x-3 border-b border-hair py-1.5 max-md:grid-cols-[1.25rem_minmax(0,1fr)]"
          >
            <span className="text-center font-mono font-bold">
              <span aria-hidden>{passed ? "✓" : "×"}</span>
              <span className="sr-only">{passed ? "passed" : "failed"}</span>
            </span>
            <span className="font-semibold">{checkName(id)}</span>
            <span className="wrap-anywhere max-md:col-start-2">{detail}</span>
          </li>
        ))}
      </ul>
      <dl className="grid grid-cols-[auto_minmax(0,1fr)] gap-x-4 text-small">
        <Digest name="Original, SHA-256" digest={input.sha256} />
        <Digest name="Tuned, SHA-256" digest={output.sha256} />
        <Digest name={`Machine ${machine.name}`} digest={machine.sha256} />
        {profile && <Digest name={`Profile ${profile.name}`} digest={profile.sha256} />}
        <Digest name="Engine" digest={engine} />
      </dl>
    </div>
  );
}

function Digest({ name, digest }: { name: string; digest: string }) {
  return (
    <>
      <dt className="text-soft">{name}</dt>
      <dd className="font-mono text-fine leading-5 wrap-anywhere">{digest}</dd>
    </>
  );
}

/** "removed-only-driven" -> "Removed only driven" */
const checkName = (id: string): string => id[0].toUpperCase() + id.slice(1).replaceAll("-", " ");
