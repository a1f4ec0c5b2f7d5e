import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { findJsonError } from "#shared/formats/json-error.ts";
import { parseJson } from "#shared/formats/parse-json.ts";
import { refusal } from "#tests/shared/formats/documents.ts";

test("valid JSON is parsed, with or without a byte order mark", () => {
  expect(parseJson('{"a": [1, null]}', "profile")).toEqual({ a: [1, null] });
  expect(parseJson('\ufeff{"a": 1}\r\n', "profile")).toEqual({ a: 1 });
});

describe("broken JSON is refused with line and column", () => {
  test.each([
    ["comma before }", '{\n  "a": 1,\n}', 'line 3, column 1: a field name in double quotes was expected, found "}"'],
    ["comma before ]", "[1,\r\n]", 'line 2, column 1: a value was expected, found "]"'],
    ["missing comma", '{"a": 1\r"b": 2}', 'line 2, column 1: "," or "}" was expected, found "\\""'],
    ["missing colon", '{"a" 1}', 'line 1, column 6: ":" was expected after the field name, found "1"'],
    ["single quotes", "{'a': 1}", 'line 1, column 2: a field name in double quotes was expected, found "\'"'],
    ["comment", "// machine\n{}", 'line 1, column 1: a value was expected, found "/"'],
    ["leading zero", "[01]", 'line 1, column 2: a value was expected, found "0"'],
    ["NaN", '{"a": NaN}', 'line 1, column 7: a value was expected, found "N"'],
    ["line break in a text", '["a\nb"]', 'line 1, column 4: a closing " was expected, found "\\n"'],
    ["unknown escape", '["\\x"]', 'line 1, column 3: a valid escape such as \\n or \\\\ was expected, found "\\\\"'],
    ["text that never ends", '["a', 'line 1, column 4: a closing " was expected, found the end of the text'],
    ["two documents", "{}\n{}", 'line 2, column 1: the end of the text was expected, found "{"'],
    ["wrong bracket", "[1}", 'line 1, column 3: "," or "]" was expected, found "}"'],
    ["cut off", '{"a": [1', 'line 1, column 9: "," or "]" was expected, found the end of the text'],
    ["nothing", "", "line 1, column 1: a value was expected, found the end of the text"],
    ["not JSON at all", "🙂", 'line 1, column 1: a value was expected, found "🙂"'],
  ])("%s", (_, text, place) => {
    const { code, message } = refusal(() => parseJson(text, "M.json"));
    expect(code).toBe("bad-json");
    expect(message).toBe(`M.json is not valid JSON: ${place}.`);
  });
});

test("no depth of nesting is too deep to be told where it breaks", () => {
  expect(findJsonError("[".repeat(200_000)).offset).toBe(200_000);
});

/** Whether JSON.parse accepts a text. */
function isJson(text: string): boolean {
  try {
    JSON.parse(text);
    return true;
  } catch {
    return false;
  }
}

test("for valid JSON the place is its end, whatever the value", () => {
  fc.assert(
    fc.property(fc.json(), (text) => {
      expect(findJsonError(text).offset).toBe(text.length);
    }),
  );
});

test("what stands before the place is the beginning of some JSON, and no longer with the next character", () => {
  const scraps = fc.constantFrom(
    "{",
    "}",
    "[",
    "]",
    ",",
    ":",
    '"a"',
    '"',
    "1",
    "-",
    "0",
    ".5",
    "e3",
    "true",
    "nul",
    " ",
    "\n",
    "\\",
  );
  fc.assert(
    fc.property(fc.array(scraps, { maxLength: 12 }), (parts) => {
      const text = parts.join("");
      fc.pre(!isJson(text));
      const { offset, expected } = findJsonError(text);
      expect(offset).toBeLessThanOrEqual(text.length);
      // Asked about the right beginning alone, the scan gets as far, and a valid beginning is not called an error.
      expect(findJsonError(text.slice(0, offset)).offset).toBe(offset);
      expect(expected).not.toBe("");
    }),
  );
});
