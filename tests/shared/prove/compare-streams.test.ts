import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { Reading } from "#shared/layers/reading.ts";
import { compareStreams } from "#shared/prove/compare-streams.ts";
import { bytesOf, chunksOf, readBytes } from "#tests/shared/prove/proving.ts";
import { smallMachine, smallPart } from "#tests/shared/prove/small-part.ts";

const machine = smallMachine();
const reading = readBytes(bytesOf(smallPart()), machine);

/** What the comparison needs of a reading, for any bytes. */
function readingOf(text: string, numbered = false): Reading {
  const finalNewline = /^(\xef\xbb\xbf)?$|[\r\n]$/.test(text);
  return {
    ...reading,
    controls: [],
    pauses: [],
    file: { ...reading.file, bytes: text.length, numbered, finalNewline, newline: "mixed" },
  };
}

const compare = (original: string, tuned: string, chunk: number, numbered = false) =>
  compareStreams({
    original: chunksOf(bytesOf(original), chunk),
    tuned: chunksOf(bytesOf(tuned), chunk + 3),
    reading: readingOf(original, numbered),
    machine,
  });

/** Bytes that are hard on a reader of lines. */
const text = fc
  .array(
    fc.constantFrom(
      "\n",
      "\r",
      "\r\n",
      "G1 X1",
      "M",
      "q",
      ";",
      "(",
      " ",
      "N1 ",
      "*33",
      "\xef\xbb\xbf",
      "\xe9",
      "0",
      "G1 X10 Y20 E0.5",
    ),
    { maxLength: 60 },
  )
  .map((pieces) => pieces.join(""));

describe("whatever the bytes and however they are cut", () => {
  test("two equal files are found equal, and their lines are counted", () =>
    fc.assert(
      fc.asyncProperty(text, fc.integer({ min: 1, max: 50 }), fc.boolean(), async (same, chunk, numbered) => {
        const { difference, kept, renumbered, removed, inserted } = await compare(same, same, chunk, numbered);
        const lines = same.replace(/^\xef\xbb\xbf/, "").match(/[^\r\n]*(?:\r\n|\r|\n)|[^\r\n]+$/g) ?? [];
        expect({ difference, kept, renumbered, removed, inserted }).toEqual({
          difference: undefined,
          kept: lines.length,
          renumbered: 0,
          removed: 0,
          inserted: 0,
        });
      }),
      { numRuns: 500 },
    ));

  test("one byte changed, left out or put in is a difference", () =>
    fc.assert(
      fc.asyncProperty(
        text,
        fc.nat(),
        fc.constantFrom("", "x", "\n", "\r", "7"),
        fc.nat({ max: 1 }),
        async (original, place, by, gone) => {
          const at = place % (original.length + 1);
          const tuned = original.slice(0, at) + by + original.slice(at + gone);
          fc.pre(tuned !== original);
          expect((await compare(original, tuned, 1 + (place % 20))).difference).toBeDefined();
        },
      ),
      { numRuns: 1000 },
    ));
});

test("files that end anywhere in a line or a chunk are compared to their ends", async () => {
  for (let bytes = 0; bytes < 24; bytes++)
    for (let chunk = 1; chunk < 9; chunk++)
      for (const gone of [0, 1, 2, 5]) {
        const original = `G28\n${"x".repeat(bytes)}`;
        const { difference } = await compare(original, original.slice(0, original.length - gone), chunk);
        expect([bytes, chunk, gone, difference === undefined]).toEqual([bytes, chunk, gone, gone === 0]);
      }
});

test("a line longer than any that is read ends the comparison", async () => {
  const long = `;${"x".repeat((1 << 20) + 70_000)}`;
  const { difference } = await compare(`G28\n${long}\n`, `G28\n${long}y\n`, 1 << 16);
  expect(difference?.message).toBe("a line is longer than 1 MiB");
});

test("memory does not grow with the file", async () => {
  const piece = bytesOf("G1 X10.123 Y20.456 E0.12345\n".repeat(2048));
  const pieces = 400;
  let largest = 0;
  const before = process.memoryUsage().arrayBuffers;
  async function* stream() {
    for (let k = 0; k < pieces; k++) {
      if (k % 50 === 0) largest = Math.max(largest, process.memoryUsage().arrayBuffers - before);
      yield piece;
    }
  }
  const file = { ...reading.file, bytes: piece.length * pieces, finalNewline: true };
  const found = await compareStreams({
    original: stream(),
    tuned: stream(),
    reading: { ...readingOf("\n"), file },
    machine,
  });
  expect([found.difference, found.kept]).toEqual([undefined, 2048 * pieces]);
  expect(largest).toBeLessThan(4 << 20);
});
