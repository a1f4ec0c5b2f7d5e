import { describe, expect, test, vi } from "vitest";
import { ToolpathReader } from "#shared/layers/read-toolpath.ts";
import { heights, marker, ring, rings, START } from "#tests/helpers/part.ts";
import { latin, readChunks, readText, refusalOf } from "#tests/helpers/reading.ts";
import { tern } from "#tests/helpers/tern.ts";

// Many runs, on a computer that may be busy with other things.
vi.setConfig({ testTimeout: 60_000 });

function* repeated(head: readonly string[], line: string, count: number, tail: readonly string[] = []) {
  yield latin(`${head.join("\n")}\n`);
  const block = latin(`${line}\n`.repeat(10_000));
  for (let k = 0; k < count; k += 10_000) yield count - k < 10_000 ? latin(`${line}\n`.repeat(count - k)) : block;
  yield latin(`${tail.join("\n")}\n`);
}

const PART = [...START, ";LAYER:0", ...ring(0.2)];

describe("a file that is large in one way", () => {
  test("20,000 fan lines in one layer are all kept, in order", () => {
    const { controls, layers, travels } = readChunks(repeated(PART, "M106 S77", 20_000, ring(0.4)));
    expect(controls).toHaveLength(20_000);
    expect(controls[19_999]).toMatchObject({ line: PART.length + 20_000, layer: 1, duty: 77 / 255 });
    expect(layers[0].duty["part-fan"]).toMatchObject({ commands: 20_000, max: 77 / 255 });
    expect(travels.count).toBeLessThan(10);
  });

  test("100,000 laying moves and travels in one layer keep a few hundred places to write at", () => {
    const { totals, travels } = readChunks(repeated(PART, "G1 X70 E1\nG0 X50", 50_000, ring(0.4)));
    expect(totals.depositedLengthMm).toBeCloseTo(50_000 * 20 + 160, 3);
    expect(travels.count).toBeGreaterThan(50);
    expect(travels.count).toBeLessThan(2000);
  });

  test("100,000 odd lines leave twenty findings and a count", () => {
    const { findings, file } = readChunks(repeated(PART, "?", 100_000));
    expect(findings).toHaveLength(21);
    expect(file.lines).toBe(PART.length + 100_000 + 1);
  });

  test("100,000 comments, markers and blank lines cost nothing", () => {
    const { layers, findings } = readChunks(repeated(PART, ";LAYER:1\n; text\n", 30_000, ring(0.4)));
    expect(layers).toHaveLength(2);
    expect(findings.map(({ code }) => code)).toEqual(["marker-count"]);
  });

  test("a macro of every name is told twenty times", () => {
    const names = Array.from({ length: 500 }, (_, k) => `MACRO_${k}`);
    expect(readText([...PART, ...names]).findings).toHaveLength(21);
  });
});

describe("what no sliced part has is refused, naming the line", () => {
  test("more than a million waits", () => {
    expect(refusalOf(() => readChunks(repeated(PART, "G4P1", 1_000_001)))).toMatchObject({
      code: "too-many-waits",
      place: { line: PART.length + 1_000_001 - 3 },
    });
  });

  test("more than 100,000 layers", () => {
    const reader = new ToolpathReader(tern());
    const refusal = refusalOf(() => {
      reader.push(latin("G91\nM83\nG1 Z0.2 F600\n"));
      for (let k = 0; k < 101; k++) reader.push(latin("G1 X1 E1\nG1 X-1 Z.1\n".repeat(1000)));
    });
    expect(refusal).toMatchObject({ code: "too-many-layers", place: { line: 200_004 } });
  });
});

test("progress tells bytes and layers so far", () => {
  const reader = new ToolpathReader(tern());
  const bytes = latin(`${[...START, ...rings(heights(30), marker)].join("\n")}\n`);
  reader.push(bytes.subarray(0, 100));
  expect(reader.progress).toEqual({ bytes: 0, layers: 0 });
  reader.push(bytes.subarray(100));
  expect(reader.progress).toEqual({ bytes: bytes.length, layers: 30 });
});
