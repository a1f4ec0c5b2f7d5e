import { describe, expect, test } from "vitest";
import { namedLimits, namedTemperatures } from "#shared/layers/named-settings.ts";
import { parseNamed } from "#shared/machine/output-command.ts";

const limitsOf = (line: string) => {
  const { name, parameters } = parseNamed(line);
  return namedLimits(name, parameters);
};
const temperaturesOf = (line: string) => {
  const { name, parameters } = parseNamed(line);
  return namedTemperatures(name, parameters);
};

describe("velocity limits by name", () => {
  test("speed, acceleration, corner and least cruise", () => {
    expect(
      limitsOf("SET_VELOCITY_LIMIT VELOCITY=90 ACCEL=800 SQUARE_CORNER_VELOCITY=7.5 MINIMUM_CRUISE_RATIO=0.3"),
    ).toEqual({
      maxSpeed: 90,
      printAccel: 800,
      travelAccel: 800,
      squareCorner: 7.5,
      cruiseRatio: 0.3,
    });
  });

  test("an acceleration to a stop is the older form of the least cruise", () => {
    expect(limitsOf("SET_VELOCITY_LIMIT ACCEL=1000 ACCEL_TO_DECEL=250")!.cruiseRatio).toBeCloseTo(0.75, 12);
    expect(limitsOf("SET_VELOCITY_LIMIT ACCEL=1000 ACCEL_TO_DECEL=2000")!.cruiseRatio).toBe(0);
    expect(limitsOf("SET_VELOCITY_LIMIT ACCEL_TO_DECEL=500")!.cruiseRatio).toBeUndefined();
  });

  test("what is no number above zero is left out", () => {
    for (const value of ["", "x", "0", "-5", "{a}", "Infinity"])
      expect(limitsOf(`SET_VELOCITY_LIMIT ACCEL=${value} VELOCITY=${value}`)).toMatchObject({
        maxSpeed: undefined,
        printAccel: undefined,
      });
    for (const ratio of ["1", "-0.1", "x"])
      expect(limitsOf(`SET_VELOCITY_LIMIT MINIMUM_CRUISE_RATIO=${ratio}`)!.cruiseRatio).toBeUndefined();
  });

  test("other names set none", () => {
    expect(limitsOf("SET_PIN PIN=a VALUE=1")).toBeUndefined();
  });
});

describe("temperatures by name", () => {
  test("of one heater, and of a start macro's arguments", () => {
    expect(temperaturesOf("SET_HEATER_TEMPERATURE HEATER=extruder1 TARGET=385")).toEqual({ nozzleC: 385 });
    expect(temperaturesOf("SET_HEATER_TEMPERATURE HEATER=heater_bed TARGET=120")).toEqual({ bedC: 120 });
    expect(temperaturesOf("SET_HEATER_TEMPERATURE HEATER=chamber TARGET=90")).toEqual({});
    expect(temperaturesOf("START EXTRUDER_TEMP=385 BED_TEMP=120 CHAMBER=90")).toEqual({ nozzleC: 385, bedC: 120 });
    expect(temperaturesOf("START NOZZLE=385 BEDTEMPERATURE=120")).toEqual({ nozzleC: 385, bedC: 120 });
  });

  test("the first of two counts, and what is no temperature does not", () => {
    expect(temperaturesOf("START HOTEND=380 NOZZLE=390")).toEqual({ nozzleC: 380 });
    expect(temperaturesOf("START EXTRUDER=a BED=0 TOOLS=3 BEDS=2").nozzleC).toBeUndefined();
  });
});
