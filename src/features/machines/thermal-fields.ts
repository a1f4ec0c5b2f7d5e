import type { Machine } from "#shared/formats/machine.ts";
import type { Quantity, Thermal } from "#shared/formats/thermal.ts";
import { unitOf, wordsOf } from "#src/lib/document-words.ts";

/** One quantity of what surrounds the part: where it stands in `thermal`, and how it is called. */
export interface ThermalField {
  path: readonly string[];
  label: string;
  unit: string;
  /** what the arrow keys add and take away */
  step: number;
  hint?: string;
}

export interface ThermalGroup {
  title: string;
  fields: ThermalField[];
}

/** The quantities of a machine: those of the room, then those of each of its fans and lamps. */
export function thermalGroups({ channels }: Pick<Machine, "channels">): ThermalGroup[] {
  const of = (kind: "fan" | "heater") => channels.filter((channel) => channel.kind === kind);
  return [
    {
      title: "Room",
      fields: [
        field("roomAirC", 1),
        field("wallsC", 1, "what the part radiates to; empty: as warm as the air"),
        field("bedAir.riseC", 1),
        field("bedAir.decayMm", 5),
        field("convection.h0WM2K", 1),
        field("bedContactM2KW", 0.0001, "resistance"),
      ],
    },
    ...of("fan").map(({ id }) => ({
      title: `Fan ${id}`,
      fields: [field(`convection.fans.${id}.h1WM2K`, 1), field(`convection.fans.${id}.exponent`, 0.05)],
    })),
    ...of("heater").map(({ id }) => ({
      title: `Heater ${id}`,
      fields: [
        field(`lamps.${id}.fluxAtFullWM2`, 100),
        field(`lamps.${id}.sideShare`, 0.05),
        field(`lamps.${id}.exponent`, 0.05),
        field(`lamps.${id}.lagS`, 0.1, "empty: from the settle time"),
      ],
    })),
    ...(of("heater").length === 0
      ? []
      : [
          {
            title: "Surroundings",
            fields: [field("surroundings.riseAtFullLampC", 1), field("surroundings.lagS", 10)],
          },
        ]),
  ];
}

function field(path: string, step: number, hint?: string): ThermalField {
  const pattern = `thermal.${path.replace(/^(convection\.fans|lamps)\.[^.]+/, "$1.*")}`;
  return { path: path.split("."), label: wordsOf(pattern), unit: unitOf(pattern) ?? "", step, hint };
}

/** The quantity at a place; undefined where the document leaves it out. */
export function quantityAt(thermal: Thermal | undefined, path: readonly string[]): Quantity | undefined {
  let value: unknown = thermal;
  for (const key of path) value = typeof value === "object" && value !== null ? Reflect.get(value, key) : undefined;
  return value as Quantity | undefined;
}

/** The machine with a quantity replaced or, undefined, left out; parts without any quantity are left out too. */
export function withQuantity(machine: Machine, path: readonly string[], quantity: Quantity | undefined): Machine {
  return withThermal(machine, replaced(machine.thermal, path, quantity) as Thermal | undefined);
}

/** Without `thermal` where nothing of it is left. */
export function withThermal({ thermal: _, ...machine }: Machine, thermal: Thermal | undefined): Machine {
  return thermal === undefined ? machine : { ...machine, thermal };
}

function replaced(value: unknown, [key, ...rest]: readonly string[], leaf: unknown): unknown {
  if (key === undefined) return leaf;
  const { [key]: old, ...others } = (value ?? {}) as Record<string, unknown>;
  const next = replaced(old, rest, leaf);
  const made = next === undefined ? others : { ...others, [key]: next };
  return Object.keys(made).length === 0 ? undefined : made;
}

/** The three boxes of a quantity, each empty or a number. */
export interface Boxes {
  low: number | undefined;
  typical: number | undefined;
  high: number | undefined;
}

export function boxesOf(quantity: Quantity | undefined): Boxes {
  if (quantity === undefined) return { low: undefined, typical: undefined, high: undefined };
  return typeof quantity === "number" ? { low: undefined, typical: quantity, high: undefined } : { ...quantity };
}

/**
 * What three boxes say: nothing, one number, or a range. A range that is not complete yet stays so: it is a problem that
 * the check names, and what was typed is kept.
 */
export function quantityOf({ low, typical, high }: Boxes): Quantity | undefined {
  if (low === undefined && high === undefined) return typical;
  const given = Object.entries({ low, typical, high }).filter(([, value]) => value !== undefined);
  return Object.fromEntries(given) as unknown as Quantity;
}

/** What is said of a channel goes with its new id, or, undefined, with the channel. */
export function withThermalOf(machine: Machine, id: string, next: string | undefined): Machine {
  if (id === next) return machine;
  return [["convection", "fans"], ["lamps"]].reduce((moved, path) => {
    const said = quantityAt(moved.thermal, [...path, id]);
    if (said === undefined) return moved;
    const without = withQuantity(moved, [...path, id], undefined);
    return next === undefined ? without : withQuantity(without, [...path, next], said);
  }, machine);
}
