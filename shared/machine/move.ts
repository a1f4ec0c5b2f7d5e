/**
 * One straight move as a row of numbers, handed from interpreter to layers to planner in one typed array: doubles passed
 * as arguments would each be boxed on the hottest path of the reader.
 */
export const X0 = 0;
export const Y0 = 1;
export const Z0 = 2;
export const X1 = 3;
export const Y1 = 4;
export const Z1 = 5;
/** filament fed, mm, negative when retracting */
export const FED = 6;
/** length of the displacement, mm; 0 for a move of material alone */
export const LENGTH = 7;
/** programmed speed, mm/s */
export const SPEED = 8;

export const newMove = (): Float64Array => new Float64Array(9);
