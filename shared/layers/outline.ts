/** A part from the side, coarsely: enough to recognise it in a list. */
export interface Outline {
  /** over all layers, mm */
  widthMm: number;
  heightMm: number;
  /** bands of equal height from the bottom up: how far the part reaches, as shares of its width; null where there is none */
  bands: ([left: number, right: number] | null)[];
}

export interface OutlineLayer {
  zMm: number;
  heightMm: number;
  boxMm: { min: readonly number[]; max: readonly number[] };
}

export const OUTLINE_BANDS = 24;

/** Bands that a layer fills, first and last: those whose middle it covers, and the one that holds its own middle. */
export function bandsOf({ zMm, heightMm }: OutlineLayer, topMm: number): [first: number, last: number] {
  const bandMm = topMm / OUTLINE_BANDS;
  const within = (band: number) => Math.min(OUTLINE_BANDS - 1, Math.max(0, band));
  if (!(bandMm > 0)) return [0, 0];
  const own = within(Math.floor((zMm - heightMm / 2) / bandMm));
  const first = within(Math.ceil((zMm - heightMm) / bandMm - 0.5));
  const last = within(Math.floor(zMm / bandMm - 0.5));
  return [Math.min(own, first), Math.max(own, last)];
}

export const topOf = (layers: readonly OutlineLayer[]): number =>
  layers.reduce((highest, { zMm }) => Math.max(highest, zMm), 0);

/** The part's outline along Y, objects printed one after another side by side. */
export function outlineOf(layers: readonly OutlineLayer[]): Outline {
  const topMm = topOf(layers);
  const from = layers.reduce((least, { boxMm }) => Math.min(least, boxMm.min[0]), Number.POSITIVE_INFINITY);
  const to = layers.reduce((most, { boxMm }) => Math.max(most, boxMm.max[0]), Number.NEGATIVE_INFINITY);
  const widthMm = to > from ? to - from : 0;
  const bands: Outline["bands"] = Array.from({ length: OUTLINE_BANDS }, () => null);
  if (widthMm > 0) for (const layer of layers) widen(bands, bandsOf(layer, topMm), layer, from, widthMm);
  return { widthMm, heightMm: topMm, bands };
}

function widen(
  bands: Outline["bands"],
  [first, last]: readonly [number, number],
  { boxMm }: OutlineLayer,
  fromMm: number,
  widthMm: number,
): void {
  const [left, right] = [(boxMm.min[0] - fromMm) / widthMm, (boxMm.max[0] - fromMm) / widthMm].map(rounded);
  for (let band = first; band <= last; band++) {
    const old = bands[band];
    bands[band] = old === null ? [left, right] : [Math.min(old[0], left), Math.max(old[1], right)];
  }
}

/** A list has no use for more. */
const rounded = (share: number): number => Math.round(share * 1000) / 1000;
