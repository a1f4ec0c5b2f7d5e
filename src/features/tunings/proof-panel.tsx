import type { ProofDocument } from "#shared/formats/proof.ts";
import { CHECK_NAMES, checkGroups } from "#src/features/tunings/check-names.ts";
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
          ? `The proof holds: ${checks.length} of ${checks.length}.`
          : `The proof does not hold: ${failed} of ${checks.length} failed. This file must not be printed.`}
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
      {checkGroups(checks).map(({ title, checks: some }) => (
        <section key={title} aria-label={title}>
          <h3 className="border-b border-ink pb-1 text-small font-semibold">{title}</h3>
          <ul>
            {some.map(({ id, passed, detail }) => (
              <li
                key={id}
                className="grid grid-cols-[5rem_16rem_minmax(0,1fr)] gap-x-3 border-b border-hair py-1.5 max-md:grid-cols-[5rem_minmax(0,1fr)]"
              >
                <span className={passed ? "text-soft" : "font-semibold"}>{passed ? "holds" : "× fails"}</span>
                <span className="font-semibold">{CHECK_NAMES[id] ?? id}</span>
                <span className="wrap-anywhere max-md:col-start-2">{detail}</span>
              </li>
            ))}
          </ul>
        </section>
      ))}
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
