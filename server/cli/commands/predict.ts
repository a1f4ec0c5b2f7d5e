import { parseArguments, required } from "#server/cli/arguments.ts";
import { loadMachine, loadProfile } from "#server/cli/documents.ts";
import { aboutFile, EXIT, type ExitStatus, InputRefused } from "#server/cli/exit.ts";
import { ToolpathInput } from "#server/cli/input-stream.ts";
import { cardFor } from "#server/cli/polymer-card.ts";
import { predictionTable } from "#server/cli/prediction-table.ts";
import { readInput } from "#server/cli/read-input.ts";
import { print, printable } from "#server/cli/terminal.ts";
import { checkFit } from "#shared/formats/fit.ts";
import { writePrediction } from "#shared/formats/prediction.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { predictPlan } from "#shared/plan/predict-plan.ts";
import { Refusal } from "#shared/refusal.ts";

/** `predict`: what the layers of a toolpath are expected to become under a profile. Nothing is written. */
export async function predict(argv: string[]): Promise<ExitStatus> {
  const { files, values } = parseArguments("predict", argv, ["FILE"]);
  const machine = await loadMachine(required(values.machine, "machine", "predict"));
  const profileName = required(values.profile, "profile", "predict");
  const profile = await loadProfile(profileName);
  const { polymer, notice } = await cardFor(profile, profileName, values.polymer);
  await aboutFile(profileName, () => checkFit(machine, profile, polymer));
  const input = await ToolpathInput.open(files[0], "once");
  try {
    const { layers } = await readInput(input, machine);
    const about = (work: () => string) => aboutProfileOr(input.name, profileName, work);
    const text = about(() => {
      const plan = planDuties({ layers, machine, profile, polymer });
      const prediction = predictPlan({ layers, machine, profile, polymer, plan });
      if (notice !== undefined) prediction.advice.unshift({ layer: 1, code: "card-shipped", message: notice });
      if (values.json) return writePrediction(prediction);
      return printable(predictionTable({ name: input.name, layers, machine, profile, polymer, plan, prediction }));
    });
    await print(text);
    return EXIT.done;
  } finally {
    await input.close();
  }
}

/** A refusal that names a place in a document is about the profile; the others are about the toolpath. */
function aboutProfileOr(fileName: string, profileName: string, work: () => string): string {
  try {
    return work();
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    throw new InputRefused(error, error.place.path === undefined ? fileName : profileName);
  }
}
