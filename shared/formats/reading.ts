import { z } from "zod";
import { parseDocument, writeDocument } from "#shared/formats/document.ts";
import { Duty, Finite, fields, perChannel, Sha256, wholeWithin } from "#shared/formats/fields.ts";

/** 1-based number of a line or layer. */
const Ordinal = wholeWithin(1, Number.MAX_SAFE_INTEGER);
const Count = wholeWithin(0, Number.MAX_SAFE_INTEGER);
const Corner = z.tuple([Finite, Finite], { error: "must be a pair [x, y]" });

/** One layer of a reading: what was measured in the toolpath. Units are in the names. */
export const LayerReading = fields({
  index: Ordinal,
  /** 1-based, rises where Z falls and a new object begins */
  object: Ordinal,
  zMm: Finite,
  heightMm: Finite,
  firstLine: Ordinal,
  lastLine: Ordinal,
  timeS: Finite,
  extrudingTimeS: Finite,
  depositedLengthMm: Finite,
  travelLengthMm: Finite,
  filamentMm: Finite,
  volumeMm3: Finite,
  areaMm2: Finite,
  outlineMm: Finite,
  outlineFrom: z.enum(["comments", "geometry"]),
  boxMm: fields({ min: Corner, max: Corner }),
  /** set-points; null where none was set yet, °C */
  nozzleC: Finite.nullable(),
  bedC: Finite.nullable(),
  /** as commanded in the file while the layer lasted; the mean is weighted by time */
  duty: perChannel(fields({ mean: Finite, min: Duty, max: Duty, commands: Count })),
  /** seconds is null where the wait's length is not known */
  waits: z.array(
    fields({
      kind: z.enum(["temperature", "home", "tool", "pause", "dwell"]),
      line: Ordinal,
      seconds: Finite.nullable(),
    }),
  ),
});
export type LayerReading = z.infer<typeof LayerReading>;

/** A reading document, `quenchline.reading/1`: what `read --json` puts out. */
export const ReadingDocument = fields({
  format: z.literal("quenchline.reading/1"),
  file: fields({
    bytes: Count,
    lines: Count,
    sha256: Sha256,
    newline: z.enum(["lf", "crlf", "cr", "mixed", "none"]),
  }),
  totals: fields({
    printTimeS: Finite,
    layers: Count,
    depositedLengthMm: Finite,
    travelLengthMm: Finite,
    filamentMm: Finite,
  }),
  layers: z.array(LayerReading),
  /** line and layer are left out where the finding is about the file as a whole */
  findings: z.array(
    fields({
      code: z.string(),
      severity: z.enum(["info", "warning"]),
      line: Ordinal.optional(),
      layer: Ordinal.optional(),
      message: z.string(),
    }),
  ),
});
export type ReadingDocument = z.infer<typeof ReadingDocument>;

/** @throws Refusal `bad-reading` naming every problem with its path */
export function parseReading(json: unknown): ReadingDocument {
  return parseDocument(ReadingDocument, json, "reading");
}

/** The document as JSON text; `parseReading` reads it back unchanged. */
export function writeReading(reading: ReadingDocument): string {
  return writeDocument(ReadingDocument, reading);
}
