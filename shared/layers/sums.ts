/**
 * What the layer builder sums up move by move, as places in one typed array. This file imports nothing, so that the
 * bundler writes the places as literals.
 */

export const FILAMENT = 0;
export const MIN_X = 1;
export const MAX_X = 2;
export const MIN_Y = 3;
export const MAX_Y = 4;
/** start of the open run of laying moves */
export const RUN_X = 5;
export const RUN_Y = 6;
/** raw Z of the last laying move, to leave the common case at once */
export const LAST_Z = 7;
export const SUMS = 8;
