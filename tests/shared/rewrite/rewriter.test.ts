import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { Edit } from "#shared/rewrite/edits.ts";
import { apply } from "#tests/shared/rewrite/tuning.ts";

const cuts = fc.array(fc.integer({ min: 1, max: 30 }), { maxLength: 5 });

/** A text and edits within it: ascending, not overlapping, as an EditList gives them. */
const edited = fc
  .record({
    text: fc.string({ unit: fc.constantFrom("a", "b", "\n", "\r", ";", " ", "\xe9"), maxLength: 200 }),
    edits: fc.array(
      fc.record({ gap: fc.nat(30), remove: fc.nat(20), insert: fc.constantFrom("", "M106 S1 ;ql\n", "x\ny\n") }),
      { maxLength: 8 },
    ),
  })
  .map(({ text, edits }) => {
    const list: Edit[] = [];
    let offset = 0;
    for (const { gap, remove, insert } of edits) {
      offset += gap + 1;
      if (offset + remove > text.length) break;
      list.push({ offset, remove, insert });
      offset += remove;
    }
    return { text, edits: list };
  });

/** The plain way: cut the text up. */
function cutUp(text: string, edits: readonly Edit[]): string {
  let out = "";
  let at = 0;
  for (const { offset, remove, insert } of edits) {
    out += text.slice(at, offset) + insert;
    at = offset + remove;
  }
  return out + text.slice(at);
}

describe("the rewriter", () => {
  test("gives the text with its edits, however it comes in", () =>
    fc.assert(
      fc.property(edited, cuts, ({ text, edits }, cut) => {
        expect(apply(text, edits, { numbered: false }, cut)).toBe(cutUp(text, edits));
      }),
      { numRuns: 300 },
    ));

  test("takes edits at the very start and at the very end", () => {
    const edits = [
      { offset: 0, remove: 2, insert: "x\n" },
      { offset: 6, remove: 0, insert: "y\n" },
    ];
    expect(apply("a\nb\nc\n", edits, { numbered: false })).toBe("x\nb\nc\ny\n");
    expect(apply("a\nb\nc\n", edits, { numbered: false }, [1])).toBe("x\nb\nc\ny\n");
  });

  test("hands long pieces on as they are, and gathers short ones", () => {
    const long = "a".repeat(300_000);
    const edits = [
      { offset: 10, remove: 5, insert: "x\n" },
      { offset: 299_000, remove: 0, insert: "y\n" },
    ];
    expect(apply(long, edits, { numbered: false })).toBe(cutUp(long, edits));
    expect(apply(long, edits, { numbered: false }, [7, 200_000])).toBe(cutUp(long, edits));
  });
});
