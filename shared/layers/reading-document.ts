import type { LayerReading, ReadingDocument } from "#shared/formats/reading.ts";
import type { Layer, Reading } from "#shared/layers/reading.ts";

/** What a reading tells the outside, as a `quenchline.reading/1` document. Measures are rounded to nine decimals. */
export function readingDocument({ file, totals, layers, findings }: Reading): ReadingDocument {
  const { bytes, lines, sha256, newline } = file;
  return {
    format: "quenchline.reading/1",
    file: { bytes, lines, sha256, newline },
    totals: {
      printTimeS: rounded(totals.printTimeS),
      layers: totals.layers,
      depositedLengthMm: rounded(totals.depositedLengthMm),
      travelLengthMm: rounded(totals.travelLengthMm),
      filamentMm: rounded(totals.filamentMm),
    },
    layers: layers.map(layerReading),
    findings: findings.map(({ code, severity, line, layer, message }) => ({
      code,
      severity,
      ...(line === undefined ? {} : { line }),
      ...(layer === undefined ? {} : { layer }),
      message,
    })),
  };
}

function layerReading(layer: Layer): LayerReading {
  const { boxMm, duty } = layer;
  return {
    index: layer.index,
    object: layer.object,
    zMm: rounded(layer.zMm),
    heightMm: rounded(layer.heightMm),
    firstLine: layer.firstLine,
    lastLine: layer.lastLine,
    timeS: rounded(layer.timeS),
    extrudingTimeS: rounded(layer.extrudingTimeS),
    depositedLengthMm: rounded(layer.depositedLengthMm),
    travelLengthMm: rounded(layer.travelLengthMm),
    filamentMm: rounded(layer.filamentMm),
    volumeMm3: rounded(layer.volumeMm3),
    areaMm2: rounded(layer.areaMm2),
    outlineMm: rounded(layer.outlineMm),
    outlineFrom: layer.outlineFrom,
    boxMm: { min: pair(boxMm.min), max: pair(boxMm.max) },
    nozzleC: layer.nozzleC,
    bedC: layer.bedC,
    duty: Object.fromEntries(
      Object.entries(duty).map(([id, { mean, min, max, commands }]) => [
        id,
        { mean: rounded(mean), min: rounded(min), max: rounded(max), commands },
      ]),
    ),
    waits: layer.waits.map(({ kind, line, seconds }) => ({
      kind,
      line,
      seconds: seconds === null ? null : rounded(seconds),
    })),
  };
}

/** Takes the dust of binary fractions off (0.6000000000000001); far below anything that is measured here. */
function rounded(value: number): number {
  const scale = Math.abs(value) < 1e6 ? 1e9 : 1e6;
  return Math.round(value * scale) / scale;
}

function pair([x, y]: [number, number]): [number, number] {
  return [rounded(x), rounded(y)];
}
