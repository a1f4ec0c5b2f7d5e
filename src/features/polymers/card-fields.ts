import type { Polymer, Sourced } from "#shared/formats/polymer.ts";
import { unitOf, wordsOf } from "#src/lib/document-words.ts";

/** One number of a card: where it stands in the document, and how it is called and shown. */
export interface CardField {
  path: readonly string[];
  label: string;
  unit: string;
  decimals: number;
}

export interface CardGroup {
  title: string;
  note?: string;
  fields: CardField[];
}

const field = (path: string, decimals: number): CardField => ({
  path: path.split("."),
  label: wordsOf(path),
  unit: unitOf(path) ?? "",
  decimals,
});

export const CARD_GROUPS: CardGroup[] = [
  {
    title: "Transitions",
    fields: [
      field("tgC", 0),
      field("tmC", 0),
      field("solidBelowC", 0),
      field("solidAtRelativeCrystallinity", 2),
      field("weldAboveC", 0),
    ],
  },
  {
    title: "Margins",
    note: "a profile may set its own",
    fields: [
      field("margins.belowTgC", 0),
      field("margins.aboveTgC", 0),
      field("margins.maxCrystallinity", 2),
      field("margins.minCrystallinity", 2),
    ],
  },
  {
    title: "Heat",
    fields: [
      field("densityKgM3", 0),
      field("conductivityWMK", 2),
      field("heatCapacityJKgK", 0),
      field("emissivity", 2),
      field("lampAbsorptivity.low", 2),
      field("lampAbsorptivity.typical", 2),
      field("lampAbsorptivity.high", 2),
    ],
  },
  {
    title: "Crystallinity",
    fields: [
      field("crystallinity.heatOfFusionJG", 1),
      field("crystallinity.attainable", 2),
      field("crystallinity.avramiN", 2),
      field("crystallinity.fastestPerS", 4),
      field("crystallinity.fastestAtC", 0),
      field("crystallinity.halfWidthC", 0),
    ],
  },
];

/** The number at a place of the card; undefined where this card leaves it out. */
export function sourcedAt(polymer: Polymer, path: readonly string[]): Sourced | undefined {
  let value: unknown = polymer;
  for (const key of path) value = typeof value === "object" && value !== null ? Reflect.get(value, key) : undefined;
  return value as Sourced | undefined;
}

/** A field with its number. */
export interface FilledField {
  field: CardField;
  sourced: Sourced;
}

/** The groups with the numbers that the card has; a group without any is left out. */
export function filledGroups(polymer: Polymer): { title: string; note?: string; fields: FilledField[] }[] {
  return CARD_GROUPS.map(({ fields, ...group }) => ({
    ...group,
    fields: fields.flatMap((field) => {
      const sourced = sourcedAt(polymer, field.path);
      return sourced ? [{ field, sourced }] : [];
    }),
  })).filter(({ fields }) => fields.length > 0);
}

/** How many of a card's numbers nobody has checked. */
export function unverifiedCount(polymer: Polymer): { unverified: number; all: number } {
  const numbers = filledGroups(polymer).flatMap(({ fields }) => fields);
  return {
    unverified: numbers.filter(({ sourced }) => sourced.confidence === "unverified").length,
    all: numbers.length,
  };
}

/** The card with one of its numbers replaced. */
export function withSourced(polymer: Polymer, path: readonly string[], sourced: Sourced): Polymer {
  return replaced(polymer, path, sourced) as Polymer;
}

function replaced(value: unknown, [key, ...rest]: readonly string[], leaf: Sourced): unknown {
  if (key === undefined) return leaf;
  const object = value as Record<string, unknown>;
  return { ...object, [key]: replaced(object[key], rest, leaf) };
}
