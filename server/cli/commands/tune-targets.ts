import type { Arguments } from "#server/cli/arguments.ts";
import { UsageError } from "#server/cli/exit.ts";
import { checkTargets, type NamedFile, type Target, targetInPlace } from "#server/cli/targets.ts";

/** Where the results of a tuning go. */
export interface TuneTargets {
  out: Target;
  plan?: Target;
  proof?: Target;
}

/** @throws UsageError when there is not exactly one place for the tuned toolpath, or a file can't be written there */
export function tuneTargets(fileName: string, values: Arguments<"tune">["values"]): TuneTargets {
  const inPlace = values["in-place"] === true;
  if (inPlace && values.out !== undefined) throw new UsageError("--out and --in-place exclude each other", "tune");
  if (!inPlace && values.out === undefined) throw new UsageError("--out or --in-place is missing", "tune");
  const inputs = named({
    FILE: fileName,
    "--machine": values.machine,
    "--profile": values.profile,
    "--polymer": values.polymer,
  });
  const outputs = named({ "--out": values.out, "--plan": values.plan, "--proof": values.proof });
  const targets = checkTargets(outputs, inputs);
  const of = (role: string): Target | undefined => targets[outputs.findIndex((output) => output.role === role)];
  return { out: of("--out") ?? targetInPlace(fileName), plan: of("--plan"), proof: of("--proof") };
}

function named(roles: Record<string, string | undefined>): NamedFile[] {
  return Object.entries(roles).flatMap(([role, name]) => (name === undefined ? [] : [{ role, name }]));
}
