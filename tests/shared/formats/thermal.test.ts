import { describe, expect, test } from "vitest";
import { parseMachine, writeMachine } from "#shared/formats/machine.ts";
import { rangeOf } from "#shared/formats/thermal.ts";
import { type Json, problemsOf, tern } from "#tests/shared/formats/documents.ts";

const withThermal = (thermal: Json) => ({ ...tern(), thermal });

test("a machine says of its surroundings what is known, as a number or as a range, and is read back unchanged", () => {
  const thermal = {
    calibration: "seal rings, first trial",
    roomAirC: 23,
    convection: { h0WM2K: { low: 10, typical: 15, high: 20 }, fans: { "part-fan": { exponent: 0.7 } } },
    lamps: { lamp: { fluxAtFullWM2: 9_000 } },
  };
  const machine = parseMachine(withThermal(thermal));
  expect(machine.thermal).toEqual(thermal);
  expect(parseMachine(JSON.parse(writeMachine(machine)))).toEqual(machine);
  expect(parseMachine(tern()).thermal).toBeUndefined();
});

test("a number is a range without width", () => {
  expect(rangeOf(4)).toEqual({ low: 4, typical: 4, high: 4 });
  expect(rangeOf({ low: 1, typical: 2, high: 3 })).toEqual({ low: 1, typical: 2, high: 3 });
});

describe("a machine is refused", () => {
  test.each<[string, Json, RegExp]>([
    ["for a range out of order", { roomAirC: { low: 30, typical: 20, high: 25 } }, /^thermal\.roomAirC/],
    ["for kelvin", { roomAirC: 296 }, /^thermal\.roomAirC: must be between -20 and 250, got 296/],
    ["for a share in per cent", { lamps: { lamp: { sideShare: 50 } } }, /^thermal\.lamps\.lamp\.sideShare/],
    [
      "for a lamp that it has not",
      { lamps: { halogen: {} } },
      /^thermal\.lamps\.halogen: names no heater of this machine/,
    ],
    [
      "for a heater among the fans",
      { convection: { fans: { lamp: {} } } },
      /^thermal\.convection\.fans\.lamp: names no fan of this machine/,
    ],
    ["for an unknown field", { roomC: 20 }, /^thermal\.roomC: is not a known field/],
  ])("%s", (_, thermal, line) => {
    expect(problemsOf(() => parseMachine(withThermal(thermal)))[0]).toMatch(line);
  });
});
