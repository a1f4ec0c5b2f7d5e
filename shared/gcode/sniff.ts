import { Refusal } from "#shared/refusal.ts";

/** First bytes of things that people drop by mistake, and what to call them. */
const SIGNATURES: [bytes: number[] | string, looksLike: string, remedy: string][] = [
  [
    "PK\u0003\u0004",
    "a ZIP archive (project files of a slicer are such archives)",
    "Export the sliced toolpath as G-code text.",
  ],
  ["GCDE", "a binary G-code container", "Switch binary output off in the slicer and export G-code text."],
  [[0x1f, 0x8b], "gzip inside gzip", "Unpack it once more, or send the plain file."],
  ["7z\u00bc\u00af", "a 7z archive", "Unpack it and send the G-code file."],
  ["Rar!", "a RAR archive", "Unpack it and send the G-code file."],
  ["%PDF", "a PDF document", "Send the sliced G-code file."],
  ["\u0089PNG", "a PNG picture", "Send the sliced G-code file."],
  [[0xff, 0xd8, 0xff], "a JPEG picture", "Send the sliced G-code file."],
  ["\u007fELF", "a program", "Send the sliced G-code file."],
  [[0xff, 0xfe], "UTF-16 text", "Save the G-code as UTF-8 or plain ASCII text."],
  [[0xfe, 0xff], "UTF-16 text", "Save the G-code as UTF-8 or plain ASCII text."],
  ["<?xml", "an XML document", "Send the sliced G-code file."],
  ["{", "a JSON document", "Send the sliced G-code file; machine and profile documents go in their own fields."],
];

const startsWith = (head: Uint8Array, bytes: number[] | string): boolean => {
  const wanted = typeof bytes === "string" ? [...bytes].map((c) => c.charCodeAt(0)) : bytes;
  return head.length >= wanted.length && wanted.every((byte, k) => head[k] === byte);
};

/**
 * Refuses what is plainly not text G-code, saying what it looks like.
 *
 * @param head the first bytes of the file, up to a few hundred
 * @throws Refusal `not-gcode`
 */
export function refuseForeign(head: Uint8Array): void {
  const refuse = (looksLike: string, remedy: string): never => {
    throw new Refusal("not-gcode", `this is not text G-code: it looks like ${looksLike}`, remedy, { line: 1 });
  };
  for (const [bytes, looksLike, remedy] of SIGNATURES) if (startsWith(head, bytes)) refuse(looksLike, remedy);
  const text = String.fromCharCode(...head.subarray(0, 512));
  if (/^\s*solid\s/i.test(text) || /\bfacet\s+normal\b/.test(text))
    refuse("an STL model", "Slice it first and send the G-code that the slicer writes.");
  let zeros = 0;
  for (const byte of head) if (byte === 0) zeros++;
  if (zeros > 0)
    refuse("binary data (it holds zero bytes; a binary STL model has them)", "Send the sliced G-code file as text.");
}
