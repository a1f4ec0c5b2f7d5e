import { z } from "zod";
import { parseDocument, writeDocument } from "#shared/formats/document.ts";
import {
  ChannelId,
  Duty,
  DutyAboveZero,
  fields,
  Label,
  numberWithin,
  perChannel,
  positiveUpTo,
  Share,
  Version,
  wholeWithin,
} from "#shared/formats/fields.ts";
import { checkCurve, checkLimits, checkMargins, checkZone, checkZones } from "#shared/formats/profile-checks.ts";

/** What a curve is read against: layer time in s, deposited length in mm, or height of the layer's top in mm. */
export const CurveOver = z.enum(["layer-time", "deposited-length", "height"]);
export type CurveOver = z.infer<typeof CurveOver>;

/** A point of a curve: [s or mm, duty 0-1]. */
export const CurvePoint = z.tuple([numberWithin(0, 1e9), Duty], { error: "must be a pair [x, duty]" });
export type CurvePoint = z.infer<typeof CurvePoint>;

/** How one channel's duty is found in a zone. */
export const Rule = z.discriminatedUnion("rule", [
  fields({ channel: ChannelId, rule: z.literal("fixed"), duty: Duty }),
  /** piecewise linear between the points, held flat outside them */
  fields({
    channel: ChannelId,
    rule: z.literal("curve"),
    over: CurveOver,
    points: z.array(CurvePoint).max(1_000).superRefine(checkCurve),
  }),
  /** solved from the zone's target */
  fields({ channel: ChannelId, rule: z.literal("hold"), baseDuty: Duty.optional() }),
]);
export type Rule = z.infer<typeof Rule>;

/** A document may give one rule or a list; inside it is always a list. */
const Rules = z
  .preprocess((value) => (Array.isArray(value) ? value : [value]), z.array(Rule).max(64))
  .default(() => []);

const State = z.enum(["amorphous", "semi-crystalline"]);

/**
 * Two states within one zone, reached by rules that hold: so many layers of the one, so many of the other, over and over;
 * or from the one at the zone's lowest layer to the other at its highest.
 */
export const Pattern = z.discriminatedUnion("kind", [
  fields({
    kind: z.literal("alternating"),
    amorphousLayers: wholeWithin(1, 10_000),
    semiCrystallineLayers: wholeWithin(1, 10_000),
    first: State.default("amorphous"),
  }),
  fields({ kind: z.literal("graded"), from: State, to: State }),
]);
export type Pattern = z.infer<typeof Pattern>;

/**
 * A band of the part's height. It covers (from, to] of a layer's top, so a layer whose top lies exactly on a border
 * belongs to the lower zone. With `unit: "layer"` the same holds for layer numbers: `from: 10` begins with layer 11.
 * The first zone always begins with the first layer; with `unit: "layer"` it may say so as `from: 0` or `from: 1`.
 */
export const Zone = fields({
  name: Label,
  /** mm, layer number or fraction of the object's height, as `unit` says */
  from: numberWithin(0, 1e6),
  /** left out in the last zone: to the top */
  to: numberWithin(0, 1e6).optional(),
  unit: z.enum(["mm", "layer", "fraction"]),
  target: z.enum(["amorphous", "semi-crystalline", "none"]),
  /** states within the zone; its `target` is then "none" */
  pattern: Pattern.optional(),
  /** height above `from` over which duties run from the lower zone's value to this zone's, mm */
  rampMm: numberWithin(0, 10_000).default(0),
  cooling: Rules,
  heating: Rules,
}).superRefine(checkZone);
export type Zone = z.infer<typeof Zone>;

/** Limits of one channel. They can only narrow the machine's; what is left out adds no limit. */
export const Limits = fields({
  minDuty: Duty.optional(),
  maxDuty: Duty.optional(),
  /** largest change from one layer to the next in print order */
  maxDutyPerLayer: DutyAboveZero.optional(),
  maxDutyPerS: positiveUpTo(1_000).optional(),
  /** a heater steps down to its idle duty over the last millimetres, mm */
  endRampMm: numberWithin(0, 10_000).optional(),
}).superRefine(checkLimits);
export type Limits = z.infer<typeof Limits>;

/** How far ahead of its layer a duty is commanded: seconds, or half the channel's settle time. */
export const Lead = z.union([numberWithin(0, 3_600), z.literal("settle")], {
  error: 'must be a number of seconds from 0 to 3600, or "settle"',
});
export type Lead = z.infer<typeof Lead>;

/** Overrides of the polymer card's margins; what is left out stays as the card says. */
export const Margins = fields({
  /** an amorphous layer is held this far below Tg, K */
  belowTgC: numberWithin(0, 300).optional(),
  /** a semi-crystalline layer is held this far above Tg, K */
  aboveTgC: numberWithin(0, 300).optional(),
  /** an amorphous layer has at most this absolute crystallinity, 0-1 */
  maxCrystallinity: Share.optional(),
  /** a semi-crystalline layer has at least this absolute crystallinity, 0-1 */
  minCrystallinity: Share.optional(),
}).superRefine(checkMargins);
export type Margins = z.infer<typeof Margins>;

/** A profile document, `quenchline.profile/1`, with all defaults filled in. */
export const Profile = fields({
  format: z.literal("quenchline.profile/1"),
  name: Label,
  /** where a team keeps versions; it tells where the document comes from and is no part of what it says */
  version: Version.optional(),
  /** name of the polymer card it was written for */
  polymer: Label,
  /** the first `count` layers of each object's bed have their own duties */
  bedLayers: fields({ count: wholeWithin(0, 10_000), duty: perChannel(Duty).default(() => ({})) }).default(() => ({
    count: 0,
    duty: {},
  })),
  /** from the bottom up */
  zones: z.array(Zone).max(1_000).superRefine(checkZones),
  limits: perChannel(Limits).default(() => ({})),
  /** channels left out lead by 0 */
  lead: perChannel(Lead).default(() => ({})),
  /** what becomes of the file's own commands inside a layer (bridges, overhangs) */
  withinLayer: z.enum(["replace", "keep-raises"]).default("replace"),
  margins: Margins.optional(),
});
export type Profile = z.infer<typeof Profile>;

/**
 * Checks a profile document and fills in its defaults.
 *
 * @param json parsed JSON
 * @throws Refusal `bad-profile` naming every problem with its path
 */
export function parseProfile(json: unknown): Profile {
  return parseDocument(Profile, json, "profile");
}

/** The document as JSON text; equal profiles give equal text, and `parseProfile` reads it back unchanged. */
export function writeProfile(profile: Profile): string {
  return writeDocument(Profile, profile);
}

/** Whether a rule of the profile is solved from its zone's target, which takes a polymer card. */
export const holds = ({ zones }: Profile): boolean =>
  zones.some(({ cooling, heating }) => [...cooling, ...heating].some(({ rule }) => rule === "hold"));
