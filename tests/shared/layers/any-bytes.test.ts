import fc from "fast-check";
import { describe, expect, test, vi } from "vitest";
import { parseReading, writeReading } from "#shared/formats/reading.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { readingDocument } from "#shared/layers/reading-document.ts";
import { anyFile, cuts } from "#tests/helpers/any-file.ts";
import { corpusIsHere, corpusToolpath } from "#tests/helpers/corpus.ts";
import { cutAt, cutEvery, outcomeOf, readChunks } from "#tests/helpers/reading.ts";
import { EVERY_RULE, tern } from "#tests/helpers/tern.ts";

// Many runs, on a computer that may be busy with other things.
vi.setConfig({ testTimeout: 60_000 });

const machine = tern({
  motion: { honourFileLimits: true },
  channels: [
    ...tern().channels,
    { id: "side", kind: "fan", drive: { by: "named-fan", name: "a" } },
    { id: "shelf", kind: "fan", drive: { by: "pin", pin: 4, fullScale: 1 } },
  ],
});

/** A file's lines with their places, the plain way. */
function linesOf(bytes: Uint8Array): { text: string; offset: number }[] {
  let offset = 0;
  return (
    Buffer.from(bytes)
      .toString("latin1")
      .match(/[^\r\n]*(\r\n|\r|\n)|[^\r\n]+$/g) ?? []
  ).map((text) => {
    offset += text.length;
    return { text, offset: offset - text.length };
  });
}

const isReading = (outcome: object): outcome is Reading => "layers" in outcome;

/** What must hold for every reading, whatever the file. */
function checkPlaces(reading: Reading, bytes: Uint8Array): void {
  const lines = linesOf(bytes);
  const bom = lines[0].text.startsWith("\u00ef\u00bb\u00bf") ? 3 : 0;
  const startOf = (line: number): number => (line === 1 ? bom : (lines[line - 1]?.offset ?? bytes.length));
  const wrong: string[] = [];
  const must = (holds: boolean, what: string): void => {
    if (!holds) wrong.push(what);
  };
  must(reading.file.lines === lines.length, "number of lines");
  must(reading.file.bytes === bytes.length, "number of bytes");
  must(reading.file.finalNewline === /[\r\n]$/.test(lines[lines.length - 1].text), "final newline");
  for (const { offset, length, line } of [...reading.controls, ...reading.pauses]) {
    const end = lines[line - 1].offset + lines[line - 1].text.length;
    must(offset === startOf(line) && offset + length === end, `bytes of line ${line}`);
  }
  let before = 0;
  for (const [k, layer] of reading.layers.entries()) {
    must(layer.index === k + 1, "layers count up");
    must(layer.firstByte === startOf(layer.firstLine), `first byte of layer ${k + 1}`);
    must(layer.endByte === startOf(layer.lastLine + 1), `end of layer ${k + 1}`);
    must(layer.writeAt.offset === startOf(layer.writeAt.line), `write position of layer ${k + 1}`);
    must(layer.writeAt.offset >= before && layer.writeAt.offset <= layer.firstByte, `order of layer ${k + 1}`);
    must(layer.startsAtS >= layer.writeAt.timeS, `time of layer ${k + 1}`);
    must(k === 0 || layer.firstByte >= reading.layers[k - 1].endByte, `layers follow one another at ${k + 1}`);
    must(layer.extrudingTimeS <= layer.timeS + 1e-9 * (1 + reading.window.end.timeS), `laying time of layer ${k + 1}`);
    before = layer.writeAt.offset;
  }
  const { window, travels } = reading;
  must(window.end.offset === startOf(window.end.line), "end of the window");
  must(window.start.offset <= window.end.offset && window.start.timeS <= window.end.timeS, "order of the window");
  for (let i = 0; i < travels.count; i++) {
    must(travels.offset[i] === startOf(travels.line[i]), `travel before line ${travels.line[i]}`);
    must(
      travels.offset[i] >= window.start.offset && travels.offset[i] < window.end.offset,
      "travels lie in the window",
    );
    must(
      i === 0 || (travels.offset[i] > travels.offset[i - 1] && travels.timeS[i] >= travels.timeS[i - 1]),
      "travels rise",
    );
  }
  must(reading.totals.printTimeS >= 0 && reading.afterLastLayerS >= -1e-9, "times are not negative");
  expect(wrong).toEqual([]);
}

describe("any bytes whatever", () => {
  test("are read or refused, the same however they are cut", () => {
    fc.assert(
      fc.property(anyFile, cuts, (bytes, places) => {
        const whole = outcomeOf(() => readChunks([bytes], machine));
        expect(outcomeOf(() => readChunks(cutAt(bytes, places), machine))).toEqual(whole);
        expect(outcomeOf(() => readChunks(cutEvery(bytes, 1), machine))).toEqual(whole);
      }),
      { numRuns: 150 },
    );
  });

  test("have every place of a reading at the line that it names", () => {
    let readings = 0;
    fc.assert(
      fc.property(anyFile, (bytes) => {
        const outcome = outcomeOf(() => readChunks([bytes], machine));
        if (!isReading(outcome)) return;
        readings++;
        checkPlaces(outcome, bytes);
      }),
      { numRuns: 300 },
    );
    expect(readings).toBeGreaterThan(50);
  });

  test.each(EVERY_RULE)("give a document that can be written and read back: %s", (_, other) => {
    fc.assert(
      fc.property(anyFile, (bytes) => {
        const outcome = outcomeOf(() =>
          readChunks([bytes], { ...machine, motion: { ...other.motion, honourFileLimits: true } }),
        );
        if (!isReading(outcome)) return;
        const document = readingDocument({ ...outcome, file: { ...outcome.file, sha256: "0".repeat(64) } });
        expect(parseReading(JSON.parse(writeReading(document)))).toEqual(document);
      }),
      { numRuns: 30 },
    );
  });
});

describe.skipIf(!corpusIsHere)("real toolpaths", () => {
  test.each(["c02", "c13", "d04-fan-heater-mix"] as const)("%s is read the same in chunks of any size", (name) => {
    const bytes = corpusToolpath(name).subarray(0, 400_000);
    const whole = readChunks([bytes], machine);
    checkPlaces(whole, bytes);
    for (const size of [997, 65_536]) expect(readChunks(cutEvery(bytes, size), machine)).toEqual(whole);
  });
});
