import type { z } from "zod";
import type { Polymer } from "#shared/formats/polymer.ts";

const KELVIN = 273.15;
/**
 * Tg over Tm of the usual polymers lies between 0.60 and 0.75 (PEEK 416/616 = 0.675); a wider window catches the column
 * of another quantity taken for Tg. From memory of the trade, no source.
 */
const LEAST_RATIO = 0.5;
const MOST_RATIO = 0.8;

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

  const report = (path: PropertyKey[], message: string) =>
    context.addIssue({ code: "custom", path, message, input: card });

  atMost(["lampAbsorptivity", "low"], lamp.low.value, "lampAbsorptivity.typical", lamp.typical.value);
  atMost(["lampAbsorptivity", "typical"], lamp.typical.value, "lampAbsorptivity.high", lamp.high.value);
  const { maxCrystallinity, minCrystallinity } = margins;
  atMost(["margins", "maxCrystallinity"], maxCrystallinity.value, "margins.minCrystallinity", minCrystallinity.value);
  if (crystallinity === null) {
    if (!card.amorphousReachable)
      report(["amorphousReachable"], "is false, but with crystallinity null nothing crystallises. Give true");
    return;
  }

  if (card.tmC === undefined) {
    report(["tmC"], "is missing. Add it, or give crystallinity null for an amorphous polymer");
    return;
  }
  const [tgC, tmC] = [card.tgC.value, card.tmC.value];
  below(["tgC"], tgC, "tmC", tmC);
  const ratio = (tgC + KELVIN) / (tmC + KELVIN);
  if (tgC < tmC && (ratio < LEAST_RATIO || ratio > MOST_RATIO))
    report(
      ["tgC", "value"],
      `is ${tgC}: Tg over Tm in kelvin is ${ratio.toFixed(2)}, and between ${LEAST_RATIO} and ${MOST_RATIO} for polymers that crystallise. Correct one of the two`,
    );
  atMost(["solidBelowC"], card.solidBelowC.value, "tmC", tmC);
  const attainable = crystallinity.attainable.value;
  atMost(["margins", "minCrystallinity"], minCrystallinity.value, "crystallinity.attainable", attainable);
  // The bell of the crystallisation rate is zero below Tg and above Tm, so its top lies between them.
  below(["crystallinity", "fastestAtC"], crystallinity.fastestAtC.value, "tmC", tmC);
  below(["tgC"], tgC, "crystallinity.fastestAtC", crystallinity.fastestAtC.value);
  crystallinity.halfTimes?.points.forEach(([tempC], i) => {
    if (tempC <= tgC || tempC >= tmC)
      report(
        ["crystallinity", "halfTimes", "points", i],
        `is at ${tempC} °C, not between Tg ${tgC} and Tm ${tmC}. Nothing crystallises there: remove it`,
      );
  });
}
