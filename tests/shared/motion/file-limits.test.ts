import { describe, expect, test } from "vitest";
import type { LimitChange } from "#shared/machine/interpreter.ts";
import { deviationForSquareCorner } from "#shared/motion/corner-speed.ts";
import { applyLimits } from "#shared/motion/file-limits.ts";
import { motionRules } from "#shared/motion/motion-rules.ts";
import { DEVIATION, JERK, SQUARE_CORNER, tern, ternCornering } from "#tests/helpers/tern.ts";

const rulesOf = (cornering: object) => motionRules(ternCornering(cornering).motion);

/** The rules after some lines of the file, one change each. */
function rulesAfter(machine: ReturnType<typeof rulesOf>, ...changes: LimitChange[]) {
  return changes.reduce((now, change) => applyLimits(now, machine, change), machine);
}

describe("limits that a file sets for itself", () => {
  const square = motionRules(tern().motion);

  test("change nothing when nothing is stated", () => {
    expect(rulesAfter(square, {}, { axisAccel: {}, axisSpeed: {}, jerk: {} })).toEqual(square);
  });

  test("apply until the next, up or down, and never above the machine's own", () => {
    expect(rulesAfter(square, { printAccel: 500 }).printAccel).toBe(500);
    expect(rulesAfter(square, { printAccel: 500 }, { printAccel: 900 }).printAccel).toBe(900);
    expect(rulesAfter(square, { printAccel: 500 }, { printAccel: 9000 }).printAccel).toBe(1500);
    expect(rulesAfter(square, { travelAccel: 700, retractAccel: 5000, maxSpeed: 90 })).toMatchObject({
      printAccel: 1500,
      travelAccel: 700,
      retractAccel: 1500,
      maxSpeed: 90,
    });
  });

  test("may give an axis a limit that the machine document has none for, and then hold for plain moves", () => {
    const limited = rulesAfter(square, { axisAccel: { x: 300 }, axisSpeed: { e: 20, z: 50 } });
    expect(limited).toMatchObject({
      maxAccelX: 300,
      maxSpeedE: 20,
      maxSpeedZ: 10,
      limitsXY: true,
      limitsEveryMove: true,
    });
    expect(rulesAfter(square, { axisSpeed: { e: 20, z: 5 } })).toMatchObject({
      limitsXY: false,
      limitsEveryMove: false,
    });
  });

  test("corner by the machine's own rule: words of the others are ignored", () => {
    const change: LimitChange = { squareCorner: 2, deviation: 0.001, jerk: { x: 1, e: 2 }, cruiseRatio: 0.8 };
    expect(rulesAfter(rulesOf({ ...SQUARE_CORNER, cruiseRatio: 0.5 }), change)).toMatchObject({
      cornerFactor: deviationForSquareCorner(2, 1),
      easyFactor: 2 * (1 - 0.8),
    });
    expect(rulesAfter(rulesOf(DEVIATION), change).cornerFactor).toBe(0.001);
    expect(rulesAfter(rulesOf(DEVIATION), { deviation: 1 }).cornerFactor).toBe(0.013);
    expect(rulesAfter(rulesOf(JERK), change).jerk).toEqual({ x: 1, y: 8, z: 0.4, e: 2 });
    expect(rulesAfter(rulesOf(JERK), change).cornerFactor).toBe(0);
  });

  test("can't lower the least cruise below the machine's", () => {
    const half = rulesOf({ ...SQUARE_CORNER, cruiseRatio: 0.5 });
    expect(rulesAfter(half, { cruiseRatio: 0 }).easyFactor).toBe(1);
    expect(rulesAfter(half, { cruiseRatio: 0.9 }, { cruiseRatio: 0.7 }).easyFactor).toBeCloseTo(0.6, 12);
  });
});

describe("the machine's rules as flat numbers", () => {
  test("limits left out are none", () => {
    const bare = motionRules(
      tern({ motion: { axes: {}, cornering: { rule: "square-corner-velocity", speedMmS: 5 } } }).motion,
    );
    for (const value of [
      bare.maxSpeedX,
      bare.maxAccelY,
      bare.maxSpeedZ,
      bare.maxAccelE,
      bare.extruderStepSq,
      bare.jerk.x,
      bare.lookAhead,
    ])
      expect(value).toBe(Number.POSITIVE_INFINITY);
    expect(bare).toMatchObject({ easyFactor: 2, cornering: 0, limitsXY: false, limitsEveryMove: false });
  });

  test("those stated are kept", () => {
    const rules = motionRules(
      tern({
        motion: { lookAhead: 16, extruderLimits: "every-move", axes: { y: { maxSpeedMmS: 80 } }, cornering: JERK },
      }).motion,
    );
    expect(rules).toMatchObject({
      lookAhead: 16,
      maxSpeedY: 80,
      limitsXY: true,
      limitsEveryE: true,
      limitsEveryMove: true,
    });
    expect(rules).toMatchObject({ cornering: 2, jerk: { x: 8, y: 8, z: 0.4, e: 5 } });
    expect(rulesOf(DEVIATION)).toMatchObject({ cornering: 1, cornerFactor: 0.013 });
  });
});
