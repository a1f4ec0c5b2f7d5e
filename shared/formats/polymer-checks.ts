import type { z } from "zod";
import type { Polymer } from "#shared/formats/polymer.ts";

/** What must hold between the numbers of a card. */
export function checkPolymer(card: Polymer, context: z.core.$RefinementCtx): void {
  const { margins, lampAbsorptivity: lamp, crystallinity } = card;
  const atMost = (path: string[], low: number, highName: string, high: number) => {
    if (low <= high) return;
    const message = `is ${low}, above ${highName} ${high}. Correct one of the two`;
    context.addIssue({ code: "custom", path: [...path, "value"], message, input: card });
  };
  const below = (path: string[], low: number, highName: string, high: number) => {
    if (low < high) return;
    const message = `is ${low}, not below ${highName} ${high}. Correct one of the two`;
    context.addIssue({ code: "custom", path: [...path, "value"], message, input: card });
  };

  below(["tgC"], card.tgC.value, "tmC", card.tmC.value);
  atMost(["solidBelowC"], card.solidBelowC.value, "tmC", card.tmC.value);
  atMost(["lampAbsorptivity", "low"], lamp.low.value, "lampAbsorptivity.typical", lamp.typical.value);
  atMost(["lampAbsorptivity", "typical"], lamp.typical.value, "lampAbsorptivity.high", lamp.high.value);
  const { maxCrystallinity, minCrystallinity } = margins;
  atMost(["margins", "maxCrystallinity"], maxCrystallinity.value, "margins.minCrystallinity", minCrystallinity.value);
  const attainable = crystallinity.attainable.value;
  atMost(["margins", "minCrystallinity"], minCrystallinity.value, "crystallinity.attainable", attainable);
  // The bell of the crystallisation rate is zero below Tg and above Tm, so its top lies between them.
  below(["crystallinity", "fastestAtC"], crystallinity.fastestAtC.value, "tmC", card.tmC.value);
  below(["tgC"], card.tgC.value, "crystallinity.fastestAtC", crystallinity.fastestAtC.value);
}
