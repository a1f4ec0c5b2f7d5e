import { findJsonError } from "#shared/formats/json-error.ts";
import { Refusal } from "#shared/refusal.ts";

/**
 * Parses JSON text; a byte order mark at its start is let pass.
 *
 * @param what how messages name the text, e.g. `profile` or a file's name
 * @throws Refusal `bad-json` with line and column of the first place that is not JSON, both 1-based
 */
export function parseJson(text: string, what: string): unknown {
  const json = text.startsWith("\ufeff") ? text.slice(1) : text;
  try {
    return JSON.parse(json);
  } catch {
    // Engines word this error differently and not all of them say where it is.
    const { offset, expected } = findJsonError(json);
    const before = json.slice(0, offset).split(/\r\n|\r|\n/);
    const place = `line ${before.length}, column ${before[before.length - 1].length + 1}`;
    throw new Refusal(
      "bad-json",
      `${what} is not valid JSON: ${place}: ${expected}, found ${foundAt(json, offset)}.`,
      "Correct that place; an editor that knows JSON marks it.",
    );
  }
}

function foundAt(json: string, offset: number): string {
  if (offset >= json.length) return "the end of the text";
  return JSON.stringify(String.fromCodePoint(json.codePointAt(offset) ?? 0));
}
