/**
 * Letters of words: the place of each in `LineScan.value`, and its bit in `LineScan.mask`. This file imports nothing, so
 * that the bundler writes its numbers as literals on the hot path.
 */
export const A = 0;
export const E = 4;
export const F = 5;
export const G = 6;
export const I = 8;
export const J = 9;
export const K = 10;
export const L = 11;
export const M = 12;
export const N = 13;
export const P = 15;
export const R = 17;
export const S = 18;
export const T = 19;
export const X = 23;
export const Y = 24;
export const Z = 25;
export const A_BIT = 1 << 0;
export const D_BIT = 1 << 3;
export const E_BIT = 1 << 4;
export const F_BIT = 1 << 5;
export const G_BIT = 1 << 6;
export const I_BIT = 1 << 8;
export const J_BIT = 1 << 9;
export const K_BIT = 1 << 10;
export const L_BIT = 1 << 11;
export const M_BIT = 1 << 12;
export const N_BIT = 1 << 13;
export const P_BIT = 1 << 15;
export const R_BIT = 1 << 17;
export const S_BIT = 1 << 18;
export const T_BIT = 1 << 19;
export const X_BIT = 1 << 23;
export const Y_BIT = 1 << 24;
export const Z_BIT = 1 << 25;
