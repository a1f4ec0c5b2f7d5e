import { readFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { parseMachine } from "#shared/formats/machine.ts";
import { lineChannels } from "#src/features/diff/line-channel.ts";

const machine = (name: string) =>
  parseMachine(
    JSON.parse(readFileSync(join(import.meta.dirname, `../../../../samples/machines/${name}.json`), "utf8")),
  );
const tern = lineChannels(machine("tern"));
const fulmar = lineChannels(machine("fulmar"));

test.each([
  ["M106 S81 ;ql", "part-fan"],
  ["m106 p2 s96 ;ql", "lamp"],
  ["N120 M106 P2 S0*71", "lamp"],
  ["M107", "part-fan"],
])("on indexed outputs %s drives %s", (line, channel) => expect(tern(line)?.id).toBe(channel));

test.each([
  ["SET_FAN_SPEED FAN=part_cooling SPEED=0.5", "fan"],
  ["set_pin pin=halogen value=0.25 ;ql", "heater"],
])("on named outputs %s drives a %s", (line, kind) => expect(fulmar(line)?.kind).toBe(kind));

test.each(["G1 X1 Y2 E0.1", "; M106 S255", "M104 S400", "M106 P9 S255", "", "SET_PIN PIN=other VALUE=1"])(
  "%j drives no channel",
  (line) => {
    expect(tern(line)).toBeUndefined();
    expect(fulmar(line)).toBeUndefined();
  },
);
