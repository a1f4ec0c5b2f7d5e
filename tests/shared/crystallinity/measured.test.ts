import { describe, expect, test } from "vitest";
import { densityCrystallinity, dscCrystallinity } from "#shared/crystallinity/measured.ts";

/** 26.9 kJ/mol over 192 g/mol, as the sheet has it. */
const PET = 26.9e3 / 192;

describe("DSC of PET, worked example of class sheet EMA 4666C", () => {
  test.each([
    ["C1 amorphous, first heat", 29.9, 38.2, 5.9],
    ["C2 amorphous, second heat", 0, 36.5, 26.1],
    ["C3 annealed", 0, 37.5, 26.8],
    ["C4 bottle base", 9.3, 42.2, 23.5],
    ["C5 bottle middle", 0, 37.8, 27.0],
    ["C6 bottle top", 25.9, 36.3, 7.4],
    ["C7 amorphous, first heat, group II", 22.4, 32.5, 7.2],
    ["C8 amorphous, second heat", 0, 33.1, 23.6],
    ["C9 annealed", 0, 40.7, 29.05],
    ["C10 bottle base", 0, 44.3, 31.6],
    ["C11 middle", 0, 41.5, 29.6],
    ["C12 top", 22.4, 31.5, 6.5],
  ])("%s", (_, coldCrystallisationJG, meltingJG, percent) => {
    const run = { meltingJG, coldCrystallisationJG, polymerShare: 1, heatOfFusionJG: PET };
    expect(Math.abs(100 * dscCrystallinity(run) - percent)).toBeLessThan(0.06);
  });
});

test("C13: fibres are not polymer", () => {
  const run = { meltingJG: 45, coldCrystallisationJG: 20, heatOfFusionJG: 130 };
  expect(dscCrystallinity({ ...run, polymerShare: 1 })).toBeCloseTo(0.1923, 4);
  expect(dscCrystallinity({ ...run, polymerShare: 0.7 })).toBeCloseTo(0.2747, 4);
});

test("which heat of fusion is chosen matters: 40 % for PPS between 80 and 111.7 J/g", () => {
  const of = (heatOfFusionJG: number) =>
    dscCrystallinity({ meltingJG: 40, coldCrystallisationJG: 0, polymerShare: 1, heatOfFusionJG });
  expect(of(80) / of(111.7)).toBeCloseTo(1.396, 3);
});

test("C14: density of PEEK, 1.263 amorphous and 1.400 crystal", () => {
  const at = (measured: number) => densityCrystallinity({ measured, amorphous: 1.263, crystal: 1.4 });
  expect(at(1.3).volume).toBeCloseTo(0.2701, 4);
  expect(at(1.3).mass).toBeCloseTo(0.2908, 4);
  expect(at(1.32).volume).toBeCloseTo(0.4161, 4);
  // 0.4161 * 1.4 / 1.32
  expect(at(1.32).mass).toBeCloseTo(0.4413, 4);
  expect(at(1.263)).toEqual({ volume: 0, mass: 0 });
});
