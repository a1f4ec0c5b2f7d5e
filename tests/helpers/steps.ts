import fc from "fast-check";
import type { Step } from "#tests/helpers/planning.ts";

/**
 * Random paths of the kinds that toolpaths are made of, for the laws of planning. The numbers are odd ones: where two
 * bounds are equal, the rule of the least cruise jumps, and rounding errors would decide which way.
 */

const turned = (angle: number, length: number, more: Partial<Step>): Step => ({
  dx: length * Math.cos(angle),
  dy: length * Math.sin(angle),
  dz: 0,
  de: 0,
  speedMmS: 50,
  ...more,
});

function turn(step: Step, by: number): Step {
  const [cos, sin] = [Math.cos(by), Math.sin(by)];
  return { ...step, dx: step.dx * cos - step.dy * sin, dy: step.dx * sin + step.dy * cos };
}

const speedMmS = fc.constantFrom(5.3, 20, 61, 149, 400);
const angle = fc.integer({ min: 0, max: 359 }).map((degrees) => (degrees * Math.PI) / 180);
const length = fc.constantFrom(0.011, 0.053, 0.197, 0.71, 2.3, 9.1, 41);
const perMm = fc.constantFrom(0, 0, 0.0373, 0.0373, 0.0811);

const line = fc
  .record({ angle, length, speedMmS, perMm, count: fc.nat(12) })
  .map((of): Step[] =>
    Array.from({ length: of.count + 1 }, () =>
      turned(of.angle, of.length, { speedMmS: of.speedMmS, de: of.perMm * of.length }),
    ),
  );

const zigzag = fc
  .record({ angle, length, pitch: fc.constantFrom(0.43, 1.07), speedMmS, perMm, count: fc.nat(40) })
  .map((of): Step[] =>
    Array.from({ length: of.count + 1 }, (_, k) =>
      k % 2 === 0
        ? turned(of.angle + (k % 4 === 0 ? 0 : Math.PI), of.length, { speedMmS: of.speedMmS, de: of.perMm * of.length })
        : turned(of.angle + Math.PI / 2, of.pitch, { speedMmS: of.speedMmS, de: of.perMm * of.pitch }),
    ),
  );

const circle = fc
  .record({
    angle,
    chord: fc.constantFrom(0.047, 0.31, 1.53),
    turn: fc.constantFrom(0.02, 0.1, -0.3, 0.9),
    speedMmS,
    perMm,
    count: fc.nat(120),
  })
  .map((of): Step[] =>
    Array.from({ length: of.count + 1 }, (_, k) =>
      turned(of.angle + k * of.turn, of.chord, { speedMmS: of.speedMmS, de: of.perMm * of.chord }),
    ),
  );

const retraction = fc
  .record({ angle, length, mm: fc.constantFrom(0.83, 4.1), speedMmS })
  .map((of): Step[] => [
    { dx: 0, dy: 0, dz: 0, de: -of.mm, speedMmS: 35 },
    turned(of.angle, of.length, { speedMmS: of.speedMmS }),
    { dx: 0, dy: 0, dz: 0, de: of.mm, speedMmS: 35 },
  ]);

const hop = fc
  .record({ angle, length, dz: fc.constantFrom(0.21, -0.19, 3.1), speedMmS })
  .map((of): Step[] => [
    { dx: 0, dy: 0, dz: of.dz, de: 0, speedMmS: 10 },
    turned(of.angle, of.length, { speedMmS: of.speedMmS, dz: -of.dz }),
  ]);

const wipe = fc
  .record({ angle, speedMmS })
  .map((of): Step[] => [turned(of.angle, 1.5, { speedMmS: of.speedMmS, de: -0.6 })]);

/**
 * A path of pieces of one to 120 moves. Each piece is turned a little further, for no corner to be an exact reversal:
 * its speed would be a rounding error, and a different one for every way to compute it.
 */
export const path = (most: number, least = 1): fc.Arbitrary<Step[]> =>
  fc
    .array(fc.oneof(line, zigzag, circle, retraction, hop, wipe), { minLength: least, maxLength: most })
    .map((pieces) => pieces.flatMap((piece, k) => piece.map((step) => turn(step, k * 0.001))));

/** Moves of 4 to 30 mm with clear corners, and one of them to be cut at a share of its length. */
export const cuttable = fc
  .array(
    fc.record({
      degrees: fc.integer({ min: -11, max: 11 }).map((n) => n * 15),
      length: fc.integer({ min: 4, max: 30 }),
      speedMmS,
      lays: fc.boolean(),
    }),
    { minLength: 1, maxLength: 40 },
  )
  .chain((turns) => {
    let heading = 0;
    const steps = turns.map(({ degrees, length: mm, speedMmS: speed, lays }) => {
      heading += (degrees * Math.PI) / 180;
      return turned(heading, mm, { speedMmS: speed, de: lays ? 0.04 * mm : 0 });
    });
    return fc.record({
      steps: fc.constant(steps),
      at: fc.nat(steps.length - 1),
      share: fc.double({ min: 0.25, max: 0.75, noNaN: true }),
    });
  });

/** The path with one of its moves cut in two. */
export function cutOne(steps: readonly Step[], at: number, share: number): Step[] {
  const part = (of: number): Step => {
    const { dx, dy, dz, de, speedMmS: speed } = steps[at];
    return { dx: dx * of, dy: dy * of, dz: dz * of, de: de * of, speedMmS: speed };
  };
  return [...steps.slice(0, at), part(share), part(1 - share), ...steps.slice(at + 1)];
}
