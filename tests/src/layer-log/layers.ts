import type { LogLayer } from "#src/features/layer-log/reading-tracks.ts";

/** A layer of a reading, 0.2 mm high unless told. */
export function layerOf(index: number, changes: Partial<LogLayer> = {}): LogLayer {
  return {
    index,
    object: 1,
    zMm: Math.round(index * 200) / 1000,
    heightMm: 0.2,
    firstLine: index * 10,
    lastLine: index * 10 + 9,
    timeS: 10 + index,
    extrudingTimeS: 8,
    depositedLengthMm: 500,
    travelLengthMm: 20,
    filamentMm: 15,
    volumeMm3: 40,
    areaMm2: 200,
    outlineMm: 60,
    outlineFrom: "geometry",
    boxMm: { min: [10, 10], max: [30, 20] },
    nozzleC: 400,
    bedC: 150,
    duty: {
      "part-fan": { mean: 0.4, min: 0.4, max: 0.4, commands: 1 },
      lamp: { mean: 0, min: 0, max: 0, commands: 0 },
    },
    waits: [],
    ...changes,
  };
}

export function layersOf(count: number, changes: (i: number) => Partial<LogLayer> = () => ({})): LogLayer[] {
  return Array.from({ length: count }, (_, i) => layerOf(i + 1, changes(i)));
}
