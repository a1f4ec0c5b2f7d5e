export interface Point {
  x: number;
  y: number;
}

/**
 * A rectangle with quarter-circle corners, mm. A disc is the case in which both sides equal two corner radii, so one
 * primitive covers plates, posts, slots and holes, and growing or shrinking it is exact.
 */
export interface Contour {
  x: number;
  y: number;
  widthMm: number;
  depthMm: number;
  cornerMm: number;
}

export function block(x: number, y: number, widthMm: number, depthMm: number, cornerMm: number): Contour {
  return { x, y, widthMm, depthMm, cornerMm };
}

export function disc(x: number, y: number, radiusMm: number): Contour {
  return { x, y, widthMm: 2 * radiusMm, depthMm: 2 * radiusMm, cornerMm: radiusMm };
}

/** The contour moved inwards by `byMm`; a negative value moves it outwards. */
export function inset(contour: Contour, byMm: number): Contour {
  return {
    ...contour,
    widthMm: contour.widthMm - 2 * byMm,
    depthMm: contour.depthMm - 2 * byMm,
    cornerMm: Math.max(0, contour.cornerMm - byMm),
  };
}

/** Whether a bead of the given width still fits in. */
export function holdsBead(contour: Contour, widthMm: number): boolean {
  return contour.widthMm > widthMm && contour.depthMm > widthMm;
}

/**
 * The contour as a closed polygon, counter-clockwise from the lower end of its right side; the first point is not
 * repeated at the end.
 *
 * @param chordMm longest chord of the corners, mm
 */
export function outline(contour: Contour, chordMm = 0.8): Point[] {
  const { cornerMm, widthMm, depthMm } = contour;
  const steps = cornerMm === 0 ? 0 : Math.max(2, Math.ceil((cornerMm * Math.PI) / 2 / chordMm));
  const points: Point[] = [];
  for (const [sideX, sideY, quarter] of QUARTERS) {
    const centreX = contour.x + sideX * (widthMm / 2 - cornerMm);
    const centreY = contour.y + sideY * (depthMm / 2 - cornerMm);
    for (let step = 0; step <= steps; step++) {
      const angle = (Math.PI / 2) * (quarter + (steps === 0 ? 0 : step / steps));
      points.push({ x: centreX + cornerMm * Math.cos(angle), y: centreY + cornerMm * Math.sin(angle) });
    }
  }
  return points.filter((point, index) => distanceMm(point, points.at(index - 1)!) > 1e-6);
}

/** Corners in the order they are walked: side of the centre in x and y, and the quarter turn the corner begins at. */
const QUARTERS = [
  [1, 1, 0],
  [-1, 1, 1],
  [-1, -1, 2],
  [1, -1, 3],
] as const;

export function distanceMm(a: Point, b: Point): number {
  return Math.hypot(b.x - a.x, b.y - a.y);
}
