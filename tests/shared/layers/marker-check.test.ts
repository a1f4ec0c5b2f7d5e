import { describe, expect, test } from "vitest";
import { markerShape } from "#shared/gcode/markers.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { END, heights, marker, ring, rings, START } from "#tests/helpers/part.ts";
import { findingsOf, readText } from "#tests/helpers/reading.ts";

const read = (...parts: string[][]): Reading => readText([...START, ...parts.flat(), ...END]);
const messageOf = (reading: Reading, code: string): string | undefined =>
  reading.findings.find((finding) => finding.code === code)?.message;

describe("markers that agree with the geometry are no finding", () => {
  test.each([
    ["numbers", (k: number) => [`;LAYER:${k}`]],
    ["a change with the height behind it", (_: number, z: number) => [";LAYER_CHANGE", `;Z:${z}`, ";HEIGHT:0.2"]],
    ["a change with the height in another form", (_: number, z: number) => ["; CHANGE_LAYER", `; Z_HEIGHT: ${z}`]],
    ["a beginning with its height", (_: number, z: number) => [`; BEGIN_LAYER_OBJECT z=${z.toFixed(2)}`]],
    ["number and height on one line", (k: number, z: number) => [`; layer ${k + 1}, z = ${z.toFixed(3)}`]],
    ["nothing", () => []],
  ])("%s", (_, before) => {
    const reading = read(rings(heights(4), before));
    expect(reading.layers).toHaveLength(4);
    expect(findingsOf(reading)).toEqual([]);
  });
});

describe("geometry decides, and a disagreement is told with the numbers", () => {
  test("one marker a tool at each height", () => {
    const tool = (z: number, k: number, t: number): string[] => [
      `;LAYER:${k}`,
      `T${t}`,
      ...ring(z, { x: 50 + 30 * t }),
    ];
    const reading = read(heights(3).flatMap((z, k) => [...tool(z, k, 0), ...tool(z, k, 1)]));
    expect(reading.layers).toHaveLength(3);
    expect(messageOf(reading, "marker-count")).toBe("6 layer markers, 3 layers by geometry; geometry counts");
    expect(reading.layers.map(({ waits }) => waits.length)).toEqual([2, 2, 1]);
  });

  test("empty markers at the end", () => {
    const reading = read(rings(heights(2), marker), [";LAYER:2", "G0 X0", ";LAYER:3"]);
    expect(reading.layers).toHaveLength(2);
    expect(messageOf(reading, "marker-count")).toContain("4 layer markers, 2 layers");
    expect(reading.window.end.line).toBe(reading.layers[1].lastLine + 1);
  });

  test("markers that begin late: all layers before them are kept", () => {
    const reading = read(rings(heights(4)), [";LAYER:4"], ring(1));
    expect(reading.layers).toHaveLength(5);
    expect(findingsOf(reading)).toEqual(["marker-count", `marker-late ${START.length + 21}`]);
    expect(reading.layers[4].marker).toBe("LAYER:4");
  });

  test("a stated height that differs, named once with its line", () => {
    const reading = read(rings(heights(3), (k, z) => [";LAYER_CHANGE", `;Z:${k === 0 ? z : z + 0.1}`]));
    expect(findingsOf(reading)).toEqual(["marker-height"]);
    expect(messageOf(reading, "marker-height")).toBe(
      `the marker of layer 2 (line ${START.length + 8}) states 0.5 mm, material is laid at 0.4 mm`,
    );
  });

  test("a difference of a micrometre is none", () => {
    expect(findingsOf(read(rings(heights(2), (_, z) => [";LAYER_CHANGE", `;Z:${z + 0.001}`])))).toEqual([]);
  });
});

test("the team's own marker is known beside the others", () => {
  const lines = [...START, ...rings(heights(3), (k, z) => [`;slab ${k + 1} up to ${z} mm`]), ...END];
  const reading = readText(lines, undefined, { markers: [markerShape("slab {number} up to {height} mm")] });
  expect(reading.layers.map(({ marker: text }) => text)).toEqual([
    "slab 1 up to 0.2 mm",
    "slab 2 up to 0.4 mm",
    "slab 3 up to 0.6 mm",
  ]);
  expect(reading.layers[1].writeAt.line).toBe(reading.layers[1].firstLine - 2);
  expect(readText(lines).layers[1].marker).toBeUndefined();
});
