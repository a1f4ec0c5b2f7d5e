import fc from "fast-check";
import type { Drive, Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { machineWith, profileWith } from "#tests/shared/rewrite/documents.ts";
import { type Ending, START, written } from "#tests/shared/rewrite/toolpath.ts";

/** A generated file, and what is known of it without reading it. */
export interface Generated {
  text: string;
  rows: Row[];
  /** rows of the window, [first, end) */
  first: number;
  end: number;
  ending: Ending;
  machine: Machine;
  profile: Profile;
  /** sizes of the pieces the file comes in */
  cut: number[];
}

/** A line without its terminator; `sets` names the channel whose duty it sets, and that alone. */
export interface Row {
  text: string;
  sets?: "part-fan" | "lamp";
  lays?: boolean;
  pauses?: boolean;
}

/** Outputs that may stand together in one file: a lamp by index needs a firmware that reads the index. */
const byIndex = (index: number, fullScale: number) => ({ by: "fan-index", index, fullScale });
const OUTPUTS: { fan: object; lamp: object }[] = [
  { fan: byIndex(0, 255), lamp: byIndex(2, 255) },
  { fan: byIndex(0, 1), lamp: byIndex(3, 1) },
  { fan: byIndex(0, 255), lamp: { by: "pin", pin: 4, fullScale: 255 } },
  { fan: { by: "pin", pin: 9, fullScale: 1 }, lamp: byIndex(1, 255) },
  { fan: { by: "named-fan", name: "part" }, lamp: { by: "named-pin", name: "lamp", fullScale: 1 } },
  { fan: { by: "named-pin", name: "blower", fullScale: 255 }, lamp: { by: "pin", pin: 4, fullScale: 1 } },
];

/** How a file may set an output. */
function commands(drive: Drive, duty: number): string[] {
  switch (drive.by) {
    case "fan-index": {
      const s = drive.fullScale === 255 ? Math.round(duty * 255) : Math.round(duty * 1000) / 1000;
      const forms = [`M106 P${drive.index} S${s}`, `m106 p${drive.index} s${s}`];
      if (drive.index === 0) forms.push(`M106 S${s}`, `M106 S${s} ; bridge`);
      if (duty === 0) forms.push(drive.index === 0 ? "M107" : `M107 P${drive.index}`);
      return forms;
    }
    case "pin":
      return [`M42 P${drive.pin} S${drive.fullScale === 255 ? Math.round(duty * 255) : duty}`];
    case "named-fan":
      return [`SET_FAN_SPEED FAN=${drive.name} SPEED=${duty}`, `SET_FAN_SPEED SPEED=${duty} FAN="${drive.name}"`];
    case "named-pin":
      return [`SET_PIN PIN=${drive.name} VALUE=${Math.round(duty * drive.fullScale * 1000) / 1000}`];
  }
}

const duty = fc.integer({ min: 0, max: 20 }).map((n) => n / 20);

/** What may stand anywhere between two moves. */
const kept = fc.constantFrom(
  "; a comment, caf\xe9 \xff",
  "(a comment in brackets)",
  "",
  "M117 half way, M106 S255 ;ql",
  "M106 P7 S120",
  "M107 P7",
  "M106 P1 L30 X200",
  "M220 S100",
  "G92 E0",
  "G1 E-1 F1800",
  "G4 P150",
  ";TYPE:WALL-OUTER",
  "  ; quenchline {not ours}",
);

type Item =
  | { kind: "lay" | "travel"; x: number; y: number }
  | { kind: "keep"; text: string }
  | { kind: "fan" | "lamp"; duty: number; form: number }
  | { kind: "pause"; command: string };

const place = fc.integer({ min: 0, max: 8 });
const move = (kind: "lay" | "travel") => fc.record({ kind: fc.constant(kind), x: place, y: place });
const quiet: fc.Arbitrary<Item> = fc.oneof(
  { weight: 4, arbitrary: fc.record({ kind: fc.constant("keep" as const), text: kept }) },
  {
    weight: 3,
    arbitrary: fc.record({ kind: fc.constantFrom("fan" as const, "lamp" as const), duty, form: fc.nat(3) }),
  },
  {
    weight: 1,
    arbitrary: fc.record({ kind: fc.constant("pause" as const), command: fc.constantFrom("M0", "M600", "M0 Press") }),
  },
);
const item: fc.Arbitrary<Item> = fc.oneof(
  { weight: 3, arbitrary: move("lay") },
  { weight: 2, arbitrary: move("travel") },
  { weight: 3, arbitrary: quiet },
);

const layer = fc.record({
  before: fc.array(quiet, { maxLength: 2 }),
  begin: fc.array(quiet, { maxLength: 2 }),
  body: fc.array(item, { maxLength: 8 }),
  /** begins at the bed again, as the next object does */
  falls: fc.boolean(),
  /** the travel to the layer stands before its marker */
  travelFirst: fc.boolean(),
});

const MARKERS: ((layer: number, zMm: number) => string[])[] = [
  () => [],
  (n) => [`;LAYER:${n}`],
  (_, z) => [";LAYER_CHANGE", `;Z:${z}`],
  (n, z) => [`(stratum ${n + 1} top ${z.toFixed(3)})`],
];

const parts = fc.record({
  layers: fc.array(layer, { minLength: 1, maxLength: 7 }),
  objects: fc.boolean(),
  spiral: fc.integer({ min: 0, max: 12 }),
  marker: fc.nat(MARKERS.length - 1),
  start: fc.array(quiet, { maxLength: 2 }),
  finish: fc.array(quiet, { maxLength: 3 }),
});

type Part = typeof parts extends fc.Arbitrary<infer T> ? T : never;

export const endings: fc.Arbitrary<Ending> = fc.record({
  newline: fc.constantFrom<string | string[]>("\n", "\r\n", "\r", ["\n", "\r\n", "\r"]),
  finalNewline: fc.boolean(),
  numberedFrom: fc.option(fc.constantFrom(0, 1, 98), { nil: undefined }),
});

const wanted = fc.oneof(
  duty,
  fc
    .uniqueArray(fc.tuple(fc.integer({ min: 1, max: 12 }), duty), { selector: ([x]) => x, minLength: 1, maxLength: 4 })
    .map((points) =>
      points.sort(([a], [b]) => a - b).map(([x, y]): [number, number] => [Math.round(x * 200) / 1000, y]),
    ),
);
const lead = fc.constantFrom(0, 0, 0.4, 2, 30, "settle");
const maybe = <T>(value: fc.Arbitrary<T>) => fc.option(value, { nil: undefined });

/** A profile that drives fan, lamp or both. */
export const profiles = (drives: ("fan" | "lamp")[]): fc.Arbitrary<Profile> =>
  fc
    .record({
      fan: wanted,
      lamp: wanted,
      leads: fc.tuple(lead, lead),
      perLayer: maybe(fc.constantFrom(0.05, 0.3)),
      fanPerS: maybe(fc.constantFrom(0.1, 0.4)),
      lampPerS: maybe(fc.constantFrom(0.003, 0.05, 0.3)),
      endRampMm: fc.constantFrom(0, 0.5),
      bedDuty: fc.tuple(duty, duty),
      bedLayers: fc.nat(2),
      withinLayer: fc.constantFrom("replace", "keep-raises"),
    })
    .map(({ fan, lamp, leads, perLayer, fanPerS, lampPerS, endRampMm, bedDuty, bedLayers, withinLayer }) => {
      const only = <T>(fanValue: T, lampValue: T) => ({
        ...(drives.includes("fan") ? { "part-fan": fanValue } : {}),
        ...(drives.includes("lamp") ? { lamp: lampValue } : {}),
      });
      return profileWith(
        { fan: drives.includes("fan") ? fan : undefined, lamp: drives.includes("lamp") ? lamp : undefined },
        {
          lead: only(leads[0], leads[1]),
          bedLayers: { count: bedLayers, duty: only(bedDuty[0], bedDuty[1]) },
          limits: only<object>(
            { maxDutyPerLayer: perLayer, maxDutyPerS: fanPerS },
            { maxDutyPerLayer: perLayer, maxDutyPerS: lampPerS, endRampMm },
          ),
          withinLayer,
        },
      );
    });

export const machines: fc.Arbitrary<Machine> = fc
  .record({
    outputs: fc.constantFrom(...OUTPUTS),
    fan: fc.record({
      minDuty: fc.constantFrom(0, 0.12),
      maxDuty: fc.constantFrom(0.87, 1),
      startBoostS: fc.constantFrom(0, 0.2, 1),
      settleS: fc.constantFrom(0, 3),
    }),
    lamp: fc.record({
      maxDuty: fc.constantFrom(0.85, 1),
      idleDuty: fc.constantFrom(0, 0.1),
      settleS: fc.constantFrom(0, 3),
      acts: fc.constantFrom("queued", { immediate: 1 }),
    }),
  })
  .map(({ outputs, fan, lamp }) =>
    machineWith({ fan: { ...fan, drive: outputs.fan }, lamp: { ...lamp, drive: outputs.lamp } }),
  );

function rowsOfPart(part: Part, machine: Machine): Pick<Generated, "rows" | "first" | "end"> {
  const rows: Row[] = START.map((text) => ({ text }));
  let x = 0;
  let y = 0;
  const [fan, lamp] = machine.channels;
  const setting = (kind: "fan" | "lamp", to: number, form: number): Row => {
    const forms = commands(kind === "fan" ? fan.drive : lamp.drive, to);
    return { text: forms[form % forms.length], sets: kind === "fan" ? "part-fan" : "lamp" };
  };
  const put = (item: Item): void => {
    if (item.kind === "keep") rows.push({ text: item.text });
    else if (item.kind === "pause") rows.push({ text: item.command, pauses: true });
    else if ("duty" in item) rows.push(setting(item.kind, item.duty, item.form));
    else go(item.kind === "lay", item.x * 5, item.y * 5);
  };
  const go = (lays: boolean, toX: number, toY: number, z = ""): void => {
    if (toX === x && toY === y) toX += 5;
    rows.push(lays ? { text: `G1 X${toX} Y${toY}${z} E1 F1200`, lays } : { text: `G0 X${toX} Y${toY}${z} F6000` });
    x = toX;
    y = toY;
  };
  for (const item of part.start) put(item);
  let first = -1;
  let top = 0;
  for (const [k, { before, begin, body, falls, travelFirst }] of part.layers.entries()) {
    const z = falls && part.objects && top >= 0.4 ? 0.2 : Math.round((top + 0.2) * 1000) / 1000;
    top = z;
    if (k > 0) for (const item of before) put(item);
    if (travelFirst) go(false, 10, 10, ` Z${z}`);
    const marker = MARKERS[part.marker](k, z);
    if (first < 0 && marker.length > 0) first = rows.length;
    for (const text of marker) rows.push({ text });
    for (const item of begin) put(item);
    if (!travelFirst) go(false, 10, 10, ` Z${z}`);
    if (first < 0) first = rows.length;
    go(true, 30, 10);
    for (const item of body) put(item);
    go(true, 30, 30);
  }
  for (let k = 1; k <= part.spiral; k++) {
    go(true, [10, 40, 30, 0][k % 4], [10, 0, 40, 30][k % 4], ` Z${Math.round((top + k * 0.05) * 1000) / 1000}`);
  }
  const end = rows.length;
  rows.push({ text: "G0 Z90" });
  for (const item of part.finish) if (item.kind !== "lamp" && item.kind !== "pause") put(item);
  return { rows, first, end };
}

const cuts = fc.array(fc.integer({ min: 1, max: 400 }), { maxLength: 6 });

/** @param drives what the profile drives */
export const generated = (drives: ("fan" | "lamp")[] = ["fan", "lamp"]): fc.Arbitrary<Generated> =>
  fc
    .record({ part: parts, ending: endings, machine: machines, profile: profiles(drives), cut: cuts, bare: fc.nat(3) })
    .map(({ part, ending, machine, profile, cut, bare }) => {
      const { rows, first, end } = rowsOfPart(part, machine);
      // No heater may be left on where the profile does not drive it.
      if (!drives.includes("lamp")) {
        const off = commands(machine.channels[1].drive, 0)[0];
        if (rows.some(({ sets }) => sets === "lamp")) rows.push({ text: off, sets: "lamp" });
      } else if (bare === 0) rows.length = end;
      // An empty line behind a carriage return would make a CRLF of the two.
      if (Array.isArray(ending.newline)) for (const row of rows) if (row.text === "") row.text = " ";
      // An empty last line without a terminator is none.
      if (rows[rows.length - 1].text === "") rows.pop();
      const text = written(
        rows.map((row) => row.text),
        ending,
      );
      return { text, rows, first, end, ending, machine, profile, cut };
    });
