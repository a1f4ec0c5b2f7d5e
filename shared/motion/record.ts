/**
 * How the planner keeps a move, and what a move is to it. This file imports nothing, so that the bundler writes its
 * numbers as literals on the hot path.
 */

/** what a move does: lays material, moves without laying, or only feeds or retracts material */
export const LAYS = 1;
export const TRAVELS = 2;
export const FEEDS = 0;
/** a displacement below this is none, mm */
export const NO_TRAVEL = 1e-9;
export const SQUARE_CORNER = 0;
export const JUNCTION_DEVIATION = 1;
export const AXIS_JERK = 2;
/** A record: as added, and (from the same places on) as prepared, squared speeds and spans in mm²/s². */
export const RECORD = 8;
export const DX = 0;
export const DY = 1;
export const DZ = 2;
export const DE = 3;
export const LENGTH = 4;
export const SPEED = 5;
export const LIMIT = 0;
export const SPAN = 1;
export const EASY_LIMIT = 2;
export const EASY_SPAN = 3;
export const CRUISE = 5;
export const ACCEL = 6;
export const START = 7;
/** further places of `last` */
export const LAST_CORNER = 6;
export const LAST_LIMIT = 7;
export const LAST_EASY_LIMIT = 8;
