import type { PredictedLayer, PredictionDocument } from "#shared/formats/prediction.ts";
import type { Margins } from "#shared/formats/profile.ts";
import type { Model } from "#shared/prediction/model.ts";
import type { WantedState } from "#shared/prediction/verdicts.ts";

interface Subject {
  predicted: readonly PredictedLayer[];
  wanted: readonly WantedState[];
  model: Model;
  margins: Required<Margins>;
}

interface Question {
  code: string;
  concerns: (layer: PredictedLayer, wanted: WantedState) => boolean;
  /** what is said about one layer, or about several */
  says: (subject: Subject, are: "is" | "are") => string;
}

const percent = (share: number): string => `${Math.round(share * 100)} %`;

const QUESTIONS: Question[] = [
  {
    code: "not-amorphous",
    concerns: ({ verdicts }, wanted) => wanted === "amorphous" && verdicts.reaches === "no",
    says: ({ margins }, are) =>
      `${are} expected above the ${percent(margins.maxCrystallinity)} crystallinity that counts as amorphous. Less lamp, more fan or a longer layer time would help.`,
  },
  {
    code: "not-crystalline",
    concerns: ({ verdicts }, wanted) => wanted === "semi-crystalline" && verdicts.reaches === "no",
    says: ({ margins }, are) =>
      `${are} expected below the ${percent(margins.minCrystallinity)} crystallinity that counts as semi-crystalline. More lamp or less fan would help.`,
  },
  {
    code: "uncertain-state",
    concerns: ({ verdicts }) => verdicts.reaches === "within the band",
    says: () =>
      "may or may not reach the target, which lies within the band of the uncertain inputs. Measuring them narrows it.",
  },
  {
    code: "not-solid",
    concerns: ({ verdicts }) => !verdicts.solid,
    says: ({ model }, are) =>
      `${are} not expected to hold shape, below ${model.material.solidBelowC} °C, before the nozzle returns. Cool more, print more parts at once, or slow down.`,
  },
  {
    code: "no-weld",
    concerns: ({ verdicts }) => !verdicts.welds,
    says: ({ model }, are) =>
      `${are} expected to meet what lies below at less than the weld limit of ${model.material.weldAboveC} °C. Cool less, heat more, or shorten the layer time.`,
  },
];

/** Assumptions about the part, then what is not expected to work, one entry for a run of layers. */
export function predictionAdvice(subject: Subject): PredictionDocument["advice"] {
  const { predicted, wanted, model } = subject;
  const advice: PredictionDocument["advice"] = model.notes.map((note) => ({ ...note }));
  for (const { code, concerns, says } of QUESTIONS) {
    for (const [from, to] of runs(predicted.length, (p) => concerns(predicted[p], wanted[p]))) {
      const [first, last] = [predicted[from].index, predicted[to].index];
      const message =
        from === to
          ? `Layer ${first} ${says(subject, "is")}`
          : `Layers ${first}–${last} (${to - from + 1}) ${says(subject, "are")}`;
      advice.push({ layer: first, code, message });
    }
  }
  return advice.sort((a, b) => a.layer - b.layer);
}

/** First and last position of every unbroken run. */
function runs(count: number, holds: (position: number) => boolean): [number, number][] {
  const found: [number, number][] = [];
  for (let p = 0; p < count; p++) {
    if (!holds(p)) continue;
    const last = found[found.length - 1];
    if (last !== undefined && last[1] === p - 1) last[1] = p;
    else found.push([p, p]);
  }
  return found;
}
