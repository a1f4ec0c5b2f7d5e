/**
 * Arc geometry of G2 and G3 (RS274/NGC, NISTIR 6556, section 3.5.3; check values G5–G11 of the reference sheet).
 * Lengths in mm, angles in radians, counter-clockwise positive, in the plane of the arc.
 */
export interface Arc {
  centreX: number;
  centreY: number;
  radiusMm: number;
  /** signed angle from start to end; a full turn when both coincide */
  sweepRad: number;
}

/**
 * Arc by centre offsets (I, J).
 *
 * @returns undefined when start and end do not lie on one circle: their radii differ by more than 0.5 mm, or by more
 * than 0.005 mm and 0.1 % (the present rule of an open machine controller's documentation, g-code.adoc)
 */
export function arcFromCentre(
  startX: number,
  startY: number,
  endX: number,
  endY: number,
  offsetX: number,
  offsetY: number,
  clockwise: boolean,
): Arc | undefined {
  const centreX = startX + offsetX;
  const centreY = startY + offsetY;
  const radiusMm = Math.hypot(offsetX, offsetY);
  const ex = endX - centreX;
  const ey = endY - centreY;
  const difference = Math.abs(Math.hypot(ex, ey) - radiusMm);
  if (!(radiusMm > 0) || difference > 0.5 || (difference > 0.005 && difference > 0.001 * radiusMm)) return undefined;
  const cross = -offsetX * ey + offsetY * ex;
  const dot = -offsetX * ex - offsetY * ey;
  let sweepRad = Math.atan2(cross, dot);
  if (sweepRad < 0) sweepRad += 2 * Math.PI;
  if (clockwise) sweepRad -= 2 * Math.PI;
  if (sweepRad === 0 && startX === endX && startY === endY) sweepRad = 2 * Math.PI;
  return { centreX, centreY, radiusMm, sweepRad };
}

/**
 * Arc by radius: positive takes the way up to 180°, negative the longer one.
 *
 * @returns undefined when the points coincide or lie further apart than the diameter
 */
export function arcFromRadius(
  startX: number,
  startY: number,
  endX: number,
  endY: number,
  radiusMm: number,
  clockwise: boolean,
): Arc | undefined {
  const dx = endX - startX;
  const dy = endY - startY;
  const chord = Math.hypot(dx, dy);
  const radius = Math.abs(radiusMm);
  if (chord === 0 || chord / 2 > radius * (1 + 1e-6)) return undefined;
  const height = Math.sqrt(Math.max(radius * radius - (chord * chord) / 4, 0));
  const side = clockwise === radiusMm > 0 ? -1 : 1;
  const offsetX = dx / 2 - (side * height * dy) / chord;
  const offsetY = dy / 2 + (side * height * dx) / chord;
  return arcFromCentre(startX, startY, endX, endY, offsetX, offsetY, clockwise);
}

/** Length of the path, with `riseMm` along the axis of the arc. */
export const arcLengthMm = (arc: Arc, riseMm = 0): number => Math.hypot(arc.radiusMm * arc.sweepRad, riseMm);
