import type { Machine } from "#shared/formats/machine.ts";
import { lengthOf, type Step } from "#tests/helpers/planning.ts";

/**
 * The look-ahead written down plainly: all moves at once, one array a quantity, unit vectors and roots, no window. The
 * streaming planner must give the same durations.
 */
export function wholeFilePlan(steps: readonly Step[], { motion }: Machine): number[] {
  const moves = steps.map((step) => limited(step, motion));
  const square = motion.cornering.rule === "square-corner-velocity" ? motion.cornering : undefined;

  // Start limits, first to last; the second budget may use only a share of the acceleration.
  const limit: number[] = [];
  const easyLimit: number[] = [];
  for (const [i, move] of moves.entries()) {
    const before = moves[i - 1];
    limit[i] = before ? Math.min(limit[i - 1] + before.span, cornerSq(before, move, motion)) : restSq(move, motion);
    easyLimit[i] = before ? Math.min(limit[i], easyLimit[i - 1] + before.easySpan) : limit[i];
    if (before && stopped(before, move, motion)) {
      limit[i] = motion.cornering.rule === "axis-jerk" ? restSq(move, motion) : 0;
      easyLimit[i] = limit[i];
    }
  }

  // Start speeds and peaks, last to first.
  const start: number[] = [];
  const cruise: (number | undefined)[] = [];
  let peak = 0;
  let undecided = 0;
  for (let i = moves.length - 1, next = 0, easyNext = 0; i >= 0; i--) {
    const { span, easySpan, topSq } = moves[i];
    const reach = next + span;
    const easyReach = easyNext + easySpan;
    start[i] = Math.min(limit[i], reach);
    const easyStart = Math.min(easyLimit[i], easyReach);
    if (easyStart < easyReach) {
      if (easyStart + easySpan > easyNext || undecided > 0) peak = (easyStart + easyReach) / 2;
      undecided = 0;
      cruise[i] = Math.min(topSq, (start[i] + reach) / 2, peak);
    } else undecided++;
    next = start[i];
    easyNext = easyStart;
  }

  // Moves that cannot gain speed take over that of the move before.
  let before = Number.POSITIVE_INFINITY;
  return moves.map(({ length, accel }, i) => {
    before = cruise[i] ?? Math.min(before, start[i]);
    const from = Math.min(start[i], before);
    const to = Math.min(start[i + 1] ?? 0, before);
    return trapezoidS(length, accel, Math.sqrt(from), Math.sqrt(before), Math.sqrt(to), square !== undefined);
  });
}

interface Limited {
  unit: number[];
  length: number;
  travels: boolean;
  topSq: number;
  accel: number;
  base: number;
  span: number;
  easySpan: number;
  ePerMm: number;
}

function limited(step: Step, motion: Machine["motion"]): Limited {
  const { dx, dy, dz, de, speedMmS } = step;
  const length = lengthOf(step);
  const travels = Math.hypot(dx, dy, dz) > 0;
  const parts = { x: dx, y: dy, z: dz, e: de };
  const { print, travel, retract } = motion.accelMmS2;
  const base = !travels ? retract : de !== 0 ? print : travel;
  let speed = travels ? Math.min(speedMmS, motion.maxSpeedMmS) : speedMmS;
  let accel = base;
  if (!travels && motion.axes.e?.maxSpeedMmS === undefined) speed = Math.min(speed, motion.maxSpeedMmS);
  for (const axis of ["x", "y", "z", "e"] as const) {
    const part = Math.abs(parts[axis]);
    const extruder = de < 0 || (dx === 0 && dy === 0) || motion.extruderLimits === "every-move";
    if (part === 0 || (axis === "e" && !extruder)) continue;
    const { maxSpeedMmS = Number.POSITIVE_INFINITY, maxAccelMmS2 = Number.POSITIVE_INFINITY } = motion.axes[axis] ?? {};
    speed = Math.min(speed, (maxSpeedMmS * length) / part);
    accel = Math.min(accel, (maxAccelMmS2 * length) / part);
  }
  const ratio = motion.cornering.rule === "square-corner-velocity" ? motion.cornering.cruiseRatio : 0;
  const span = 2 * accel * length;
  return {
    unit: [dx, dy, dz, de].map((part) => part / length),
    length,
    travels,
    topSq: speed * speed,
    accel,
    base,
    span,
    easySpan: Math.min(span, 2 * base * (1 - ratio) * length),
    ePerMm: de / length,
  };
}

const stopped = (a: Limited, b: Limited, motion: Machine["motion"]): boolean =>
  motion.stopAtExtrudeOnly && !(a.travels && b.travels);

function cornerSq(a: Limited, b: Limited, motion: Machine["motion"]): number {
  const common = Math.min(a.topSq, b.topSq);
  const cos = -angleDot(a, b);
  const sinHalf = Math.sqrt(Math.max((1 - cos) / 2, 0));
  const cosHalf = Math.sqrt(Math.max((1 + cos) / 2, 0));
  const { cornering } = motion;
  if (cornering.rule === "axis-jerk") {
    const { x, y, z, e } = cornering.jerkMmS;
    const v = Math.sqrt(common);
    const share = [x, y, z, e].map((jerk, axis) => jerk / Math.max(Math.abs(a.unit[axis] - b.unit[axis]) * v, 1e-300));
    return common * Math.min(1, ...share) ** 2;
  }
  if (cornering.rule === "junction-deviation")
    return Math.min(common, deviationSq(a, b, motion, cornering.deviationMm));
  const bounds = [common];
  for (const { accel, base, length } of [a, b]) {
    const deviation = (cornering.speedMmS ** 2 * (Math.SQRT2 - 1)) / base;
    if (sinHalf < 1) bounds.push((accel * deviation * sinHalf) / (1 - sinHalf));
    if (cosHalf > 0) bounds.push((accel * length * sinHalf) / cosHalf / 2);
  }
  const jump = Math.abs(a.ePerMm - b.ePerMm);
  if (b.travels && jump > 0 && cornering.extruderStepMmS !== undefined)
    bounds.push((cornering.extruderStepMmS / jump) ** 2);
  return Math.min(...bounds);
}

function deviationSq(a: Limited, b: Limited, { axes }: Machine["motion"], deviation: number): number {
  const dot = angleDot(a, b);
  if (dot > 0.999999) return Number.POSITIVE_INFINITY;
  if (dot < -0.999999) return 0;
  const change = [0, 1, 2].map((axis) => b.unit[axis] - a.unit[axis]);
  const norm = Math.hypot(...change);
  let { accel } = b;
  for (const [k, axis] of (["x", "y", "z"] as const).entries())
    accel = Math.min(accel, ((axes[axis]?.maxAccelMmS2 ?? Number.POSITIVE_INFINITY) * norm) / Math.abs(change[k]));
  const sinHalf = Math.sqrt((1 + dot) / 2);
  const bound = (accel * deviation * sinHalf) / (1 - sinHalf);
  return b.length < 1 && dot > Math.SQRT1_2
    ? Math.min(bound, (b.length * accel) / Math.max(Math.acos(dot), 0.033))
    : bound;
}

/** Cosine of the change of direction; moves of material alone lie on an axis of their own. */
function angleDot(a: Limited, b: Limited): number {
  if (a.travels !== b.travels) return 0;
  const axes = a.travels ? [0, 1, 2] : [3];
  return axes.reduce((dot, axis) => dot + a.unit[axis] * b.unit[axis], 0);
}

function restSq({ unit, topSq }: Limited, { cornering }: Machine["motion"]): number {
  if (cornering.rule !== "axis-jerk") return 0;
  const { x, y, z, e } = cornering.jerkMmS;
  const speeds = [x, y, z, e].map((jerk, axis) => jerk / Math.max(Math.abs(unit[axis]), 1e-300));
  return Math.min(Math.sqrt(topSq), ...speeds) ** 2;
}

function trapezoidS(length: number, accel: number, from: number, top: number, to: number, clips: boolean): number {
  const rest = length - (2 * top * top - from * from - to * to) / (2 * accel);
  if (clips || rest > 0) return (2 * top - from - to) / accel + Math.max(rest, 0) / top;
  return (2 * top - from - to) / accel;
}
