/**
 * One straight move in machine coordinates, mm, as a row of numbers that interpreter, layers and planner share. Doubles
 * passed as arguments or kept in object fields would be boxed on the hottest path of the reader; a row is not. A move
 * starts where the one before it ended, so the row also is the machine's position: X1 Y1 Z1.
 */
export const X0 = 0;
export const Y0 = 1;
export const Z0 = 2;
export const X1 = 3;
export const Y1 = 4;
export const Z1 = 5;
/** filament fed, mm, negative when retracting */
export const FED = 6;
/** programmed speed with its override, mm/s; stays until it changes */
export const SPEED = 7;

export const newMove = (): Float64Array => new Float64Array(8);
