import { expect, test } from "vitest";
import { isProvenance, OWN_TAGS, ownTag } from "#shared/gcode/own-lines.ts";
import { latin } from "#tests/helpers/reading.ts";

const tagOf = (comment: string) => ownTag(latin(comment), 0, comment.length);

test("a comment that is one of our tags, and nothing more, is known again", () => {
  for (const [tag, text] of Object.entries(OWN_TAGS)) expect(tagOf(text.slice(1))).toBe(tag);
  for (const comment of ["", "q", "QL", " ql", "ql ", "ql?", "ql++", "quenchline"]) expect(tagOf(comment)).toBe(false);
  expect(ownTag(latin("G28"), -1, -1)).toBe(false);
});

test("the provenance line is its word, one blank and an object", () => {
  const is = (comment: string): boolean => isProvenance(latin(comment), 0, comment.length);
  expect(is('quenchline {"engine":"1"}')).toBe(true);
  expect(is("quenchline {")).toBe(true);
  for (const comment of [
    "quenchline",
    "quenchline ",
    "quenchline [1]",
    " quenchline {}",
    "quenchline  {}",
    "Quenchline {}",
  ])
    expect(is(comment)).toBe(false);
  expect(isProvenance(latin("G28"), -1, -1)).toBe(false);
});
