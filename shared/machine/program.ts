/**
 * Numbers of a program's modal state that every move needs, kept in one typed array so that they stay unboxed. This file
 * imports nothing, so that the bundler writes the places as literals.
 */

/** machine position of the program's zero, X Y Z, mm */
export const ZERO_X = 0;
/** the program's extruder position, mm */
export const AT_E = 3;
/** millimetres in the program's unit */
export const UNIT = 4;
/** flow override */
export const FLOW = 5;

export const newProgram = (): Float64Array => Float64Array.of(0, 0, 0, 0, 1, 1);
