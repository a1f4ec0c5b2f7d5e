import { z } from "zod";
import { parseDocument, writeDocument } from "#shared/formats/document.ts";
import { fields, Label, numberWithin, positiveUpTo, Share, Version } from "#shared/formats/fields.ts";
import { checkPolymer } from "#shared/formats/polymer-checks.ts";

export const Confidence = z.enum(["published", "handbook", "unverified", "own measurement"]);
export type Confidence = z.infer<typeof Confidence>;

const Source = z.string().refine((text) => text.trim() !== "" && text.length <= 1_000, {
  error: "is empty or longer than 1000 characters. Say where the number comes from",
});

/** A number of the card with where it comes from and how far it may be trusted. */
const sourced = <Value extends z.ZodType<number>>(value: Value) =>
  fields({ value, source: Source, confidence: Confidence });

/** Bounds that catch kelvin given as °C, or a slipped decimal point. */
const TempC = sourced(numberWithin(-100, 600));
const DifferenceC = sourced(numberWithin(0, 300));
const SourcedShare = sourced(Share);
const HalfTime = z.tuple([numberWithin(-100, 600), positiveUpTo(1e6)], { error: "must be a pair [°C, s]" });

export const Sourced = sourced(z.number());
export type Sourced = z.infer<typeof Sourced>;

/** Empty for the neat polymer. */
const Variant = z.union([z.literal(""), Label], { error: "must be a short plain text, or left out" });

/** A polymer card, `quenchline.polymer/1`. Every number names its source. */
export const Polymer = fields({
  format: z.literal("quenchline.polymer/1"),
  name: Label,
  /** where a team keeps versions; it tells where the document comes from and is no part of what it says */
  version: Version.optional(),
  /** grade, filler or colour; left out: the neat polymer */
  variant: Variant.default(""),
  tgC: TempC,
  /** left out only where nothing of it crystallises */
  tmC: TempC.optional(),
  /** a layer keeps its shape below this */
  solidBelowC: TempC,
  /** or once this much of its attainable crystallinity is reached, 0-1; left out: crystals alone hold nothing */
  solidAtRelativeCrystallinity: SourcedShare.optional(),
  /** layers weld when the contact temperature passes this */
  weldAboveC: TempC,
  /** false: the polymer crystallises too fast to be printed amorphous */
  amorphousReachable: z.boolean(),
  margins: fields({
    belowTgC: DifferenceC,
    aboveTgC: DifferenceC,
    maxCrystallinity: SourcedShare,
    minCrystallinity: SourcedShare,
  }),
  densityKgM3: sourced(numberWithin(100, 5_000)),
  conductivityWMK: sourced(numberWithin(0.01, 50)),
  heatCapacityJKgK: sourced(numberWithin(100, 10_000)),
  emissivity: SourcedShare,
  lampAbsorptivity: fields({ low: SourcedShare, typical: SourcedShare, high: SourcedShare }),
  /** null: an amorphous polymer */
  crystallinity: fields({
    heatOfFusionJG: sourced(numberWithin(1, 1_000)),
    /** absolute crystallinity reached in the end, 0-1 */
    attainable: SourcedShare,
    avramiN: sourced(numberWithin(0.5, 6)),
    /** fastest rate constant of the bell, 1/s */
    fastestPerS: sourced(positiveUpTo(1e6)),
    fastestAtC: TempC,
    /** half the width of the bell at half its height, K */
    halfWidthC: sourced(positiveUpTo(300)),
    /** the team's own isothermal half-times, [°C, s]: where given, the bell is fitted to them */
    halfTimes: fields({
      points: z.array(HalfTime).min(3, { error: "has fewer than 3 points. A bell has three unknowns" }).max(1_000),
      source: Source,
      confidence: Confidence,
    }).optional(),
  }).nullable(),
}).superRefine(checkPolymer);
export type Polymer = z.infer<typeof Polymer>;

/**
 * Checks a polymer card and fills in its defaults.
 *
 * @param json parsed JSON
 * @throws Refusal `bad-polymer` naming every problem with its path
 */
export function parsePolymer(json: unknown): Polymer {
  return parseDocument(Polymer, json, "polymer");
}

/** The card as JSON text; equal cards give equal text, and `parsePolymer` reads it back unchanged. */
export function writePolymer(polymer: Polymer): string {
  return writeDocument(Polymer, polymer);
}
