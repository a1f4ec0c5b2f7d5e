/** The heights that zone bands stand beside, and the pixels they stand on; a view of the layer log is one. */
export interface BandAxis {
  /** the heights shown, mm, or, where no part is known, in the unit of the profile's borders */
  fromMm: number;
  toMm: number;
  /** pixel rows of `toMm` and `fromMm` */
  topPx: number;
  bottomPx: number;
}

/** The part a profile is edited for: tops of the layers of one object, mm, ascending. */
export interface BandPart {
  layerTopsMm: ArrayLike<number>;
}

export type BorderUnit = "mm" | "layer" | "fraction";

/** How borders of zones relate to heights on the axis. */
export interface BorderScale {
  unit: BorderUnit;
  /** height on the axis at which a border lies */
  heightOf(border: number): number;
  /** the border nearest to a height, on a layer's top where layers are known */
  borderAt(height: number): number;
  /** the border `steps` steps further up, or down where negative */
  stepped(border: number, steps: number): number;
  /** upper end of the axis */
  topMm: number;
}

/** Without a part the axis is in the profile's own unit. */
const PLAIN_STEP: Record<BorderUnit, number> = { mm: 0.1, layer: 1, fraction: 0.01 };

/** @param highest greatest border of the profile: without a part, the axis reaches somewhat above it */
export function borderScale(unit: BorderUnit, part: BandPart | undefined, highest: number): BorderScale {
  if (!part || part.layerTopsMm.length === 0) return plainScale(unit, highest);
  const tops = part.layerTopsMm;
  const topMm = tops[tops.length - 1];
  const numberAt = (height: number) => nearest(tops, height) + 1;
  const topOf = (layer: number) => (layer <= 0 ? 0 : tops[Math.min(Math.round(layer), tops.length) - 1]);
  const scales: Record<BorderUnit, BorderScale> = {
    layer: {
      unit,
      topMm,
      heightOf: topOf,
      borderAt: numberAt,
      stepped: (border, steps) => Math.min(Math.max(Math.round(border) + steps, 0), tops.length),
    },
    mm: {
      unit,
      topMm,
      heightOf: (border) => border,
      borderAt: (height) => rounded(tops[nearest(tops, height)], 3),
      stepped: (border, steps) => rounded(topOf(numberAt(border) + steps), 3),
    },
    fraction: {
      unit,
      topMm,
      heightOf: (border) => border * topMm,
      borderAt: (height) => rounded(tops[nearest(tops, height)] / topMm, 4),
      stepped: (border, steps) => rounded(topOf(numberAt(border * topMm) + steps) / topMm, 4),
    },
  };
  return scales[unit];
}

function plainScale(unit: BorderUnit, highest: number): BorderScale {
  const step = PLAIN_STEP[unit];
  const top = unit === "fraction" ? 1 : Math.max(highest * 1.4, unit === "mm" ? 5 : 10);
  const snapped = (value: number) => rounded(Math.round(value / step) * step, 4);
  return {
    unit,
    topMm: top,
    heightOf: (border) => border,
    borderAt: snapped,
    stepped: (border, steps) => snapped(border + steps * step),
  };
}

/** Position of the top nearest to a height. */
function nearest(tops: ArrayLike<number>, height: number): number {
  let low = 0;
  let high = tops.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (tops[middle] >= height) high = middle;
    else low = middle + 1;
  }
  return low > 0 && height - tops[low - 1] <= tops[low] - height ? low - 1 : low;
}

function rounded(value: number, decimals: number): number {
  return Number(value.toFixed(decimals));
}
