import { z } from "zod";
import { parseDocument, writeDocument } from "#shared/formats/document.ts";
import { Duty, fields, perChannel, wholeWithin } from "#shared/formats/fields.ts";

const LayerIndex = wholeWithin(1, 1e9);

/** Something fan and heater cannot fix, for a person to decide. */
export const Advice = fields({ layer: LayerIndex, code: z.string(), message: z.string() });
export type Advice = z.infer<typeof Advice>;

/** A plan document, `quenchline.plan/1`: the duty of every channel in every layer, and why. */
export const PlanDocument = fields({
  format: z.literal("quenchline.plan/1"),
  layers: z.array(
    fields({
      index: LayerIndex,
      duty: perChannel(Duty),
      /** by channel: the rule, then every step that changed its value */
      reason: perChannel(z.array(z.string())),
    }),
  ),
  advice: z.array(Advice),
});
export type PlanDocument = z.infer<typeof PlanDocument>;

/** @throws Refusal `bad-plan` naming every problem with its path */
export function parsePlan(json: unknown): PlanDocument {
  return parseDocument(PlanDocument, json, "plan");
}

/** The document as JSON text; `parsePlan` reads it back unchanged. */
export function writePlan(plan: PlanDocument): string {
  return writeDocument(PlanDocument, plan);
}
