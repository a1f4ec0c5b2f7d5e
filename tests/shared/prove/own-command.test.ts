import { describe, expect, test } from "vitest";
import type { Drive } from "#shared/formats/machine.ts";
import { writeDuty } from "#shared/gcode/write-command.ts";
import { ownDuty } from "#shared/prove/own-command.ts";
import { dutySteps } from "#shared/units/duty.ts";

const DRIVES: [string, Drive][] = [
  ["fan 0, 0-255", { by: "fan-index", index: 0, fullScale: 255 }],
  ["fan 2, 0-255", { by: "fan-index", index: 2, fullScale: 255 }],
  ["fan 2, 0-1", { by: "fan-index", index: 2, fullScale: 1 }],
  ["pin 4, 0-255", { by: "pin", pin: 4, fullScale: 255 }],
  ["pin 4, 0-1", { by: "pin", pin: 4, fullScale: 1 }],
  ["a named fan", { by: "named-fan", name: "part" }],
  ["a named pin", { by: "named-pin", name: "lamp", fullScale: 1 }],
  ["a named pin, 0-255", { by: "named-pin", name: "lamp", fullScale: 255 }],
];

describe.each(DRIVES)("%s", (_, drive) => {
  test("every duty that is written is read back to the same step", () => {
    const steps = dutySteps(drive);
    for (let step = 0; step <= steps; step++) expect(ownDuty(writeDuty(drive, step / steps), drive)).toBe(step / steps);
  });

  test("no other output's command is taken for its own", () => {
    for (const [name, other] of DRIVES)
      if (JSON.stringify(other) !== JSON.stringify(drive) && !sameForm(drive, other))
        expect([name, ownDuty(writeDuty(other, 0.4), drive)]).toEqual([name, undefined]);
  });
});

/** Two outputs of one name or number on two scales cannot both be on a machine; a fifth of their texts look alike. */
const sameForm = (a: Drive, b: Drive): boolean =>
  JSON.stringify({ ...a, fullScale: 0 }) === JSON.stringify({ ...b, fullScale: 0 });

test.each<[string, number]>([
  ["M106 S0128", 0],
  ["M106 S256", 0],
  ["M106 S-1", 0],
  ["M106 S12.0", 0],
  ["M106  S12", 0],
  ["M106 P0 S12", 0],
  ["m106 S12", 0],
  ["M106 S12 F3", 0],
  ["M107", 0],
  ["M106", 0],
  ["M106 P2 S1", 2],
  ["M106 P2 S0", 2],
  ["M106 P2 S.5", 2],
  ["M106 P2 S0.50", 2],
  ["M106 P2 S0.1234", 2],
  ["M106 P2 S1.1", 2],
  ["SET_FAN_SPEED FAN=part SPEED=0.50", 5],
  ["SET_FAN_SPEED FAN=part SPEED=1.001", 5],
  ["SET_FAN_SPEED FAN=parts SPEED=0.5", 5],
  ["SET_PIN PIN=lamp VALUE=0.5 CYCLE_TIME=1", 6],
  ["SET_PIN PIN=lamp VALUE=0.1", 7],
  ["SET_PIN PIN=lamp VALUE=256", 7],
])("%s is not one of ours", (code, drive) => {
  expect(ownDuty(code, DRIVES[drive][1])).toBeUndefined();
});
