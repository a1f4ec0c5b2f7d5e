/**
 * One straight move, in machine coordinates, mm. One object is filled again and again and handed from interpreter to
 * layers to planner: doubles passed as arguments would each be boxed on the hottest path of the reader. Its fields start
 * as NaN so that the engine stores them as doubles from the first move on.
 */
export class Move {
  x0 = Number.NaN;
  y0 = Number.NaN;
  z0 = Number.NaN;
  x1 = Number.NaN;
  y1 = Number.NaN;
  z1 = Number.NaN;
  /** filament fed, mm, negative when retracting */
  fedMm = Number.NaN;
  /** length of the displacement; 0 for a move of material alone */
  lengthMm = Number.NaN;
  /** programmed speed, mm/s */
  speedMmS = Number.NaN;
}
