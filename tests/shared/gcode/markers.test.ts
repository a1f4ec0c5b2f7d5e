import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { COMMENT_SHAPES, CommentReader, type CommentShape, markerShape } from "#shared/gcode/markers.ts";
import { latin } from "#tests/helpers/reading.ts";

const read = (comment: string, own: CommentShape[] = []) =>
  new CommentReader(own).read(latin(`;${comment}`), 1, comment.length + 1);

describe("what sliced files say of their layers", () => {
  test.each([
    ["LAYER:0", { says: "layer", number: 0 }],
    ["LAYER:-2", { says: "layer", number: -2 }],
    [" layer 3", { says: "layer", number: 3 }],
    ["layer #12", { says: "layer", number: 12 }],
    ["Layer 3/120", { says: "layer", number: 3 }],
    ["layer 3 of 120", { says: "layer", number: 3 }],
    [" layer 12, z = 2.4", { says: "layer", number: 12, topMm: 2.4 }],
    [" layer 12, Z = .4 mm", { says: "layer", number: 12, topMm: 0.4 }],
    ["stratum 12 top 2.400", { says: "layer", number: 12, topMm: 2.4 }],
    ["LAYER_CHANGE", { says: "layer" }],
    [" CHANGE_LAYER", { says: "layer" }],
    [" BEGIN_LAYER_OBJECT z=3.40 z_thickness=0.2", { says: "layer", topMm: 3.4 }],
    ["Z:0.6", { says: "height", topMm: 0.6 }],
    [" Z_HEIGHT: 0.4", { says: "height", topMm: 0.4 }],
    ["HEIGHT:0.25", { says: "height", heightMm: 0.25 }],
    [" LAYER_HEIGHT: 0.3", { says: "height", heightMm: 0.3 }],
    ["TYPE:WALL-OUTER", { says: "feature", outline: true }],
    ["TYPE:Outer wall", { says: "feature", outline: true }],
    [" FEATURE: External perimeter", { says: "feature", outline: true }],
    ["TYPE:FILL", { says: "feature", outline: false }],
    ["TYPE:WALL-INNER", { says: "feature", outline: false }],
    [" 'Perimeter Path', 0.8 [feed mm/s]", { says: "feature", outline: true }],
    [" 'Solid Path', 1.1 [feed mm/s]", { says: "feature", outline: false }],
  ])("%j", (comment, fact) => {
    expect(read(comment)).toEqual(fact);
  });

  test.each([
    "LAYER_COUNT:25",
    "layers: 12",
    "layer",
    " BEFORE_LAYER_CHANGE",
    "AFTER_LAYER_CHANGE",
    "END_LAYER_OBJECT z=0.2",
    "Layer height: 0.2",
    "first layer 3",
    "M106 S255",
    "",
    "   ",
    `LAYER:${"1".repeat(200)}`,
  ])("%j is no marker", (comment) => {
    expect(read(comment)).toBeUndefined();
  });
});

describe("a marker of the team's own", () => {
  test("names number and height where the template says, in any case and with any blanks", () => {
    const own = [markerShape("slab {number} up to {height} mm")];
    expect(read("slab 7 up to 1.45 mm", own)).toEqual({ says: "layer", number: 7, topMm: 1.45 });
    expect(read("  SLAB  7 up   to 1.45 mm ", own)).toMatchObject({ number: 7 });
    expect(read("slab 7 up to mm", own)).toBeUndefined();
    expect(read("slab 7 up to 1.45 mm!", own)).toBeUndefined();
    expect(read("LAYER:4", own)).toEqual({ says: "layer", number: 4 });
  });

  test("may skip words that vary, up to a blank or to what stands behind them", () => {
    expect(read("tray-b7: slab 3", [markerShape("{any}: slab {number}")])).toMatchObject({ number: 3 });
    expect(read("course12of9", [markerShape("course{number}of{any}")])).toMatchObject({ number: 12 });
    expect(read("a b: slab 3", [markerShape("{any}: slab {number}")])).toBeUndefined();
    expect(read("part-12", [markerShape("{any}{number}")])).toMatchObject({ number: -12 });
  });

  test("needs neither number nor height", () => {
    expect(read("NEXT COURSE", [markerShape("next course")])).toEqual({
      says: "layer",
      number: undefined,
      topMm: undefined,
    });
  });

  test("is literal text: nothing in it acts as a pattern", () => {
    const own = [markerShape("[a-z]+ (x|y) {number}? $.*")];
    expect(read("[a-z]+ (x|y) 5? $.*", own)).toMatchObject({ number: 5 });
    expect(read("abc x 5", own)).toBeUndefined();
  });

  test("may hold any letters; the file is read as UTF-8", () => {
    const comment = Buffer.from("Schicht Nr.\u00a05, H\u00f6he 1.2").toString("latin1");
    expect(read(comment, [markerShape("Schicht Nr.\u00a0{number}, H\u00f6he {height}")])).toMatchObject({
      number: 5,
      topMm: 1.2,
    });
  });

  test.each([
    ["{any}".repeat(12), "x".repeat(119)],
    ["{any}x".repeat(12), `${"x".repeat(118)}!`],
    ["{number}".repeat(12), "1".repeat(119)],
    ["{height}".repeat(12), "1".repeat(119)],
    ["{any}{number}".repeat(8), `${"1".repeat(118)}!`],
  ])("%s is matched or not at once", (template, comment) => {
    const started = performance.now();
    read(`${comment} `, [markerShape(`${template}\u0001`)]);
    expect(performance.now() - started).toBeLessThan(50);
  });
});

test("the letter table lets every known shape through: no marker is dismissed by its first byte", () => {
  const reader = new CommentReader();
  const everything = new CommentReader([markerShape("\u0001")]);
  fc.assert(
    fc.property(
      fc.constantFrom(
        "LAYER:",
        "layer #",
        "Z:",
        "height:",
        "TYPE:",
        "feature: ",
        "'",
        "CHANGE_LAYER",
        "begin_layer z=",
        "stratum ",
      ),
      fc.string({ unit: fc.constantFrom(..."0123456789.,: 'zZapth="), maxLength: 12 }),
      (head, tail) => {
        const bytes = latin(head + tail);
        expect(reader.read(bytes, 0, bytes.length)).toEqual(everything.read(bytes, 0, bytes.length));
      },
    ),
  );
  expect(COMMENT_SHAPES.length).toBeGreaterThan(5);
});

test("any bytes are looked at without complaint", () => {
  fc.assert(
    fc.property(fc.uint8Array({ maxLength: 200 }), (bytes) => {
      new CommentReader([markerShape("{any} {number}")]).read(bytes, 0, bytes.length);
    }),
  );
});
