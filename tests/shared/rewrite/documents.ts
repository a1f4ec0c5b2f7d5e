import { parseMachine } from "#shared/formats/machine.ts";
import { parseProfile } from "#shared/formats/profile.ts";

/** What a test changes of a machine. */
export interface MachineChanges {
  fan?: object;
  lamp?: object;
  /** further channels */
  more?: object[];
  name?: string;
}

/** A machine with a part fan, a lamp and an enclosure fan that no profile drives; 255 steps each, no limits unless given. */
export function machineWith({ fan = {}, lamp = {}, more = [], name = "Tern" }: MachineChanges = {}) {
  return parseMachine({
    format: "quenchline.machine/1",
    name,
    motion: {
      maxSpeedMmS: 200,
      accelMmS2: { print: 1500, travel: 1500, retract: 1500 },
      cornering: { rule: "square-corner-velocity", speedMmS: 5 },
    },
    channels: [
      { id: "part-fan", kind: "fan", drive: { by: "fan-index", index: 0, fullScale: 255 }, ...fan },
      { id: "lamp", kind: "heater", drive: { by: "fan-index", index: 2, fullScale: 255 }, ...lamp },
      { id: "shelf-fan", kind: "fan", drive: { by: "fan-index", index: 7, fullScale: 255 } },
      ...more,
    ],
    pauses: [
      { command: "M0", blocking: true },
      { command: "M600", blocking: false },
    ],
  });
}

/** One zone over the whole part; a number is a fixed duty, a list of points a curve over the layer's top in mm. */
export function profileWith(duties: { fan?: Wanted; lamp?: Wanted }, rest: object = {}) {
  return parseProfile({
    format: "quenchline.profile/1",
    name: "Seal ring",
    polymer: "PEEK",
    zones: [
      {
        name: "all",
        from: 0,
        unit: "mm",
        target: "none",
        ...(duties.fan === undefined ? {} : { cooling: rule("part-fan", duties.fan) }),
        ...(duties.lamp === undefined ? {} : { heating: rule("lamp", duties.lamp) }),
      },
    ],
    ...rest,
  });
}

type Wanted = number | [heightMm: number, duty: number][];

const rule = (channel: string, wanted: Wanted) =>
  typeof wanted === "number"
    ? { channel, rule: "fixed", duty: wanted }
    : { channel, rule: "curve", over: "height", points: wanted };

/** A duty of its own for each layer of 0.2 mm, from the first on; the last one holds above. */
export const perLayer = (...duties: number[]): [number, number][] =>
  duties.map((duty, k) => [Math.round((k + 1) * 200) / 1000, duty]);
