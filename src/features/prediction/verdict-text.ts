import type { PredictedLayer } from "#shared/formats/prediction.ts";
import type { Margins } from "#shared/formats/profile.ts";
import type { LayerTarget, TargetState } from "#shared/plan/layer-targets.ts";
import { fixedText } from "#src/lib/number-text.ts";

/** A judgement on a layer in words, and what to do where it is not what one wants. */
export interface Verdict {
  /** open: it may be either */
  outcome: "good" | "bad" | "open" | "plain";
  text: string;
  help?: string;
}

export interface VerdictInput {
  layer: PredictedLayer;
  target: LayerTarget | undefined;
  margins: Required<Margins>;
  /** amorphous: nothing of the polymer crystallises, so its state is no question */
  crystallises: boolean;
}

/** What becomes of a layer: its state, whether that is the one wanted, whether it keeps its shape, whether it welds. */
export function verdictsOf({ layer, target, margins, crystallises }: VerdictInput): Verdict[] {
  const { verdicts, timeToSolidS } = layer;
  return [
    ...(crystallises ? [stateVerdict(layer, margins), targetVerdict(layer, target)] : []),
    verdicts.solid
      ? {
          outcome: "good",
          text: `Solid before the nozzle returns${timeToSolidS === null ? "" : `, after ${fixedText(timeToSolidS, 1)} s`}.`,
        }
      : {
          outcome: "bad",
          text: "Not solid when the nozzle returns: the fresh bead is dragged and the shape is lost.",
          help: "More fan, less lamp, or a longer layer: several parts at a time, or a slower print.",
        },
    verdicts.welds
      ? { outcome: "good", text: "Welds to the layer below." }
      : {
          outcome: "bad",
          text: "Does not weld: where it meets the layer below it stays under the weld limit.",
          help: "More lamp, less fan, or a hotter nozzle.",
        },
  ];
}

function stateVerdict({ crystallinity, verdicts }: PredictedLayer, margins: Required<Margins>): Verdict {
  const { maxCrystallinity: most, minCrystallinity: least } = margins;
  const amount = fixedText(crystallinity, 3);
  switch (verdicts.state) {
    case "amorphous":
      return { outcome: "plain", text: `Amorphous: crystallinity ${amount}, at most ${most} counts as amorphous.` };
    case "semi-crystalline":
      return {
        outcome: "plain",
        text: `Semi-crystalline: crystallinity ${amount}, at least ${least} counts as semi-crystalline.`,
      };
    case "undecided":
      return { outcome: "plain", text: `Undecided: crystallinity ${amount} lies between ${most} and ${least}.` };
  }
}

const HELP: Partial<Record<TargetState, string>> = {
  amorphous: "Keep it cooler: less lamp, more fan, a cooler bed, or a longer layer.",
  "semi-crystalline":
    "Keep it warmer and for longer: more lamp, less fan, a hotter bed, or anneal the part afterwards.",
};

function targetVerdict({ verdicts: { reaches } }: PredictedLayer, target: LayerTarget | undefined): Verdict {
  if (target?.state === "between") {
    const way = fixedText(target.share * 100, 0);
    return { outcome: "plain", text: `Wanted between the two states, ${way} % of the way to semi-crystalline.` };
  }
  if (reaches === null || target === undefined) return { outcome: "plain", text: "No state is wanted here." };
  const wanted = target.state;
  switch (reaches) {
    case "yes":
      return { outcome: "good", text: `Reaches its target, ${wanted}, even in the worst case.` };
    case "no":
      return { outcome: "bad", text: `Misses its target, ${wanted}.`, help: HELP[target.state] };
    case "within the band":
      return {
        outcome: "open",
        text: `May reach its target, ${wanted}, or miss it: what is uncertain decides.`,
        help: HELP[target.state],
      };
  }
}
