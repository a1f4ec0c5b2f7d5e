import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { Drive } from "#shared/formats/machine.ts";
import { writeDuty } from "#shared/gcode/write-command.ts";
import { dutySteps } from "#shared/units/duty.ts";

const fan = (index: number, fullScale: 1 | 255): Drive => ({ by: "fan-index", index, fullScale });

describe("each form of output", () => {
  test.each<[Drive, number, string]>([
    [fan(2, 255), 0.62, "M106 P2 S158"],
    [fan(0, 255), 0.62, "M106 S158"],
    [fan(2, 1), 0.62, "M106 P2 S0.62"],
    [fan(0, 1), 0.5, "M106 S0.5"],
    [{ by: "pin", pin: 4, fullScale: 255 }, 0.62, "M42 P4 S158"],
    [{ by: "pin", pin: 0, fullScale: 1 }, 0.62, "M42 P0 S0.62"],
    [{ by: "named-fan", name: "part" }, 0.62, "SET_FAN_SPEED FAN=part SPEED=0.62"],
    [{ by: "named-pin", name: "lamp", fullScale: 1 }, 0.62, "SET_PIN PIN=lamp VALUE=0.62"],
    [{ by: "named-pin", name: "lamp", fullScale: 255 }, 0.62, "SET_PIN PIN=lamp VALUE=158.1"],
  ])("%o at %d is written as %j", (drive, duty, command) => {
    expect(writeDuty(drive, duty)).toBe(command);
  });
});

test("off is written as a duty of 0, not as a separate command", () => {
  expect(writeDuty(fan(2, 255), 0)).toBe("M106 P2 S0");
  expect(writeDuty({ by: "named-fan", name: "part" }, 0)).toBe("SET_FAN_SPEED FAN=part SPEED=0");
});

test("G13: where full power is 1 the value has a decimal point and never exceeds 1", () => {
  expect(writeDuty(fan(2, 1), 0)).toBe("M106 P2 S0.0");
  expect(writeDuty(fan(2, 1), 1)).toBe("M106 P2 S1.0");
  expect(writeDuty(fan(2, 1), 1 + 1e-12)).toBe("M106 P2 S1.0");
  expect(writeDuty(fan(2, 1), 0.9996)).toBe("M106 P2 S1.0");
  expect(writeDuty(fan(2, 1), 0.001)).toBe("M106 P2 S0.001");
});

test("G13: S on a 0-255 output is a whole number from 0 to 255", () => {
  expect(writeDuty(fan(0, 255), 1)).toBe("M106 S255");
  expect(writeDuty(fan(0, 255), 1 / 255)).toBe("M106 S1");
});

test.each([Number.NaN, -0.01, 1.01, Number.POSITIVE_INFINITY])("a duty of %d is never written", (duty) => {
  expect(() => writeDuty(fan(0, 255), duty)).toThrow(RangeError);
});

const scale = fc.constantFrom(1 as const, 255 as const);
const drive: fc.Arbitrary<Drive> = fc.oneof(
  fc.record({ by: fc.constant("fan-index" as const), index: fc.nat(9), fullScale: scale }),
  fc.record({ by: fc.constant("pin" as const), pin: fc.nat(99), fullScale: scale }),
  fc.record({ by: fc.constant("named-fan" as const), name: fc.constant("part") }),
  fc.record({
    by: fc.constant("named-pin" as const),
    name: fc.constant("lamp"),
    fullScale: fc.integer({ min: 1, max: 65_535 }),
  }),
);

/** The duty that a firmware reads from a command: its last word over the scale. */
function readBack(command: string, drive: Drive): number {
  const value = Number(/(?:S|=)(\d+(?:\.\d+)?)$/.exec(command)?.[1]);
  return value / (drive.by === "named-fan" ? 1 : drive.fullScale);
}

test("a written duty is read back to within half a step", () => {
  fc.assert(
    fc.property(drive, fc.double({ min: 0, max: 1, noNaN: true }), (output, duty) => {
      const read = readBack(writeDuty(output, duty), output);
      expect(Math.abs(read - duty)).toBeLessThanOrEqual(0.5 / dutySteps(output) + 2e-9);
      expect(read).toBeLessThanOrEqual(1);
    }),
  );
});

test("a duty that is a whole step is read back as it was, and written the same again", () => {
  fc.assert(
    fc.property(drive, fc.nat(1000), (output, count) => {
      const steps = dutySteps(output);
      const duty = Math.min(count, steps) / steps;
      const command = writeDuty(output, duty);
      expect(readBack(command, output)).toBeCloseTo(duty, 12);
      expect(writeDuty(output, readBack(command, output))).toBe(command);
    }),
  );
});

test("numbers carry no needless zeros, signs or exponents", () => {
  fc.assert(
    fc.property(drive, fc.double({ min: 0, max: 1, noNaN: true }), (output, duty) => {
      const value = /(?:S|=)([^S=]*)$/.exec(writeDuty(output, duty))?.[1];
      expect(value).toMatch(/^(0|[1-9]\d*)(\.0|\.\d{0,2}[1-9])?$/);
    }),
  );
});
