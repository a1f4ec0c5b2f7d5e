import type { Motion } from "#shared/formats/machine.ts";
import { FED, LENGTH, SPEED, X0, X1, Y0, Y1, Z0, Z1 } from "#shared/machine/move.ts";
import { type MotionRules, motionRules } from "#shared/motion/motion-rules.ts";

/**
 * Look-ahead planner: moves in, duration of every move out, streamed.
 *
 * Speeds are kept squared. Over a move of length L with acceleration a, v² can change by at most 2aL ("span").
 *
 *     corner limit      v²  |     .--.          start of move i   = min(corner limit, start of move i+1 + span)
 *                           |    /    \  .--.   reachable         = start of move i+1 + span
 *     backward pass  <----  |   /      \/    \  peak inside move  = mean of start and reachable, at most cruise²
 *                           +--------------------> moves
 *
 * The corner limit of a move already holds the forward bound (limit of the move before + its span), so one backward
 * pass from the newest move, which ends at rest, gives every start speed.
 *
 * With a minimum cruise ratio r a second budget is kept: the same two bounds with the span 2a(1−r)L. Only where that
 * budget lets a move both gain and lose speed may the print reach a peak; moves before it may not cruise faster than
 * that peak. r = 0 makes both budgets one.
 *
 * Streaming: later moves can only raise a start speed, never above its corner limit. So once a move j starts at its
 * limit in both budgets, everything before it is settled, up to the last peak that j and its neighbour decide. The
 * window is settled in batches; the result equals planning the whole file at once.
 *
 * A small controller sees only N blocks. Its start² is the smaller of the full result and the sum of the spans of the
 * next N blocks, from which it must be able to stop.
 */
export class Planner {
  /** durations of the moves just settled, s, and whether each lays material; valid during `onSettled` only */
  timeS = new Float64Array(0);
  lays = new Uint8Array(0);
  /** moves settled so far, and moves added so far */
  settled = 0;
  added = 0;
  /** largest number of moves ever held */
  static readonly windowLimit = 1 << 17;
  /** set when the window was full and the planner had to assume a stop */
  forcedStops = 0;

  private readonly onSettled: (count: number) => void;
  private rules: MotionRules;

  private count = 0;
  private threshold = BATCH;
  /** one record of eight numbers a move, so that a move is one cache line */
  private moves = new Float64Array(0);
  private peakSq = new Float64Array(0);
  /** direction, material per mm and corner factor of the move added last */
  private readonly last = new Float64Array(5);
  private lastMoves = false;
  private hasLast = false;
  /** state of the forward pass across batches */
  private forwardCruiseSq = 0;
  private forwardEntrySq = 0;

  /** @param onSettled called with the number of moves whose durations now stand in `timeS` */
  constructor(motion: Motion, onSettled: (count: number) => void) {
    this.rules = motionRules(motion);
    this.onSettled = onSettled;
    this.grow(2 * BATCH);
  }

  /** New limits for the moves to come (a file's own acceleration commands, where the machine honours them). */
  setRules(rules: MotionRules): void {
    this.rules = rules;
  }

  get currentRules(): MotionRules {
    return this.rules;
  }

  /**
   * Adds one straight move.
   *
   * @param row the move, see machine/move.ts
   * @param lays 1 when the move lays material
   */
  add(row: Float64Array, lays: number): void {
    const dx = row[X1] - row[X0];
    const dy = row[Y1] - row[Y0];
    const dz = row[Z1] - row[Z0];
    const de = row[FED];
    const lengthMm = row[LENGTH];
    const speedMmS = row[SPEED];
    if (this.count === this.threshold) this.settle(false);
    const rules = this.rules;
    const last = this.last;
    const moves = lengthMm > NO_TRAVEL;
    const length = moves ? lengthMm : Math.abs(de);

    let baseAccel: number;
    let accel: number;
    let speed: number;
    if (moves) {
      baseAccel = de !== 0 ? rules.printAccel : rules.travelAccel;
      accel = baseAccel;
      speed = speedMmS < rules.maxSpeed ? speedMmS : rules.maxSpeed;
      if (dz !== 0 || rules.limitsXY) {
        const z = Math.abs(dz) / length;
        if (rules.maxSpeedZ < speed * z) speed = rules.maxSpeedZ / z;
        if (rules.maxAccelZ < accel * z) accel = rules.maxAccelZ / z;
        if (rules.limitsXY) {
          const x = Math.abs(dx) / length;
          const y = Math.abs(dy) / length;
          if (rules.maxSpeedX < speed * x) speed = rules.maxSpeedX / x;
          if (rules.maxSpeedY < speed * y) speed = rules.maxSpeedY / y;
          if (rules.maxAccelX < accel * x) accel = rules.maxAccelX / x;
          if (rules.maxAccelY < accel * y) accel = rules.maxAccelY / y;
        }
      }
      if (de < 0 || (de > 0 && (rules.limitsEveryE || (dx === 0 && dy === 0)))) {
        const e = Math.abs(de) / length;
        if (rules.maxSpeedE < speed * e) speed = rules.maxSpeedE / e;
        if (rules.maxAccelE < accel * e) accel = rules.maxAccelE / e;
      }
    } else {
      baseAccel = rules.retractAccel;
      accel = baseAccel < rules.maxAccelE ? baseAccel : rules.maxAccelE;
      const cap = rules.maxSpeedE < Number.POSITIVE_INFINITY ? rules.maxSpeedE : rules.maxSpeed;
      speed = speedMmS < cap ? speedMmS : cap;
    }

    const cruiseSq = speed * speed;
    const span = 2 * accel * length;
    const easy = 2 * baseAccel * rules.easyShare * length;
    const easySpan = easy < span ? easy : span;
    const inverse = 1 / length;
    const ux = dx * inverse;
    const uy = dy * inverse;
    const uz = dz * inverse;
    const ue = de * inverse;
    const corner = accel === baseAccel ? rules.cornerFactor : rules.cornerFactor * (accel / baseAccel);

    let limit = 0;
    let easyLimit = 0;
    if (this.hasLast && ((moves && this.lastMoves) || !rules.stopAtExtrudeOnly)) {
      const before = this.moves;
      const m = (this.count - 1) * RECORD;
      const cruiseBeforeSq = before[m + CRUISE];
      const spanBefore = before[m + SPAN];
      limit = cruiseSq < cruiseBeforeSq ? cruiseSq : cruiseBeforeSq;
      const reach = before[m + LIMIT] + spanBefore;
      if (reach < limit) limit = reach;
      // Moves of material alone point along an axis of their own.
      const dot =
        moves && this.lastMoves ? ux * last[UX] + uy * last[UY] + uz * last[UZ] : moves || this.lastMoves ? 0 : ue * last[UE];
      if (rules.cornering === SQUARE_CORNER) {
        if (moves) {
          const step = ue - last[UE];
          const stepLimit = rules.extruderStepSq;
          if (stepLimit < limit * step * step) limit = stepLimit / (step * step);
        }
        // Each bound is computed only where it is the lower one, which its square tells without a root.
        const lower = corner < last[CORNER] ? corner : last[CORNER];
        const sum = lower + limit;
        if ((1 + dot) * sum * sum < 2 * limit * limit) {
          const sinHalf = Math.sqrt(dot > -1 ? 0.5 * (1 + dot) : 0);
          limit = (lower * sinHalf) / (1 - sinHalf);
        }
        const middle = 0.25 * (span < spanBefore ? span : spanBefore);
        if (middle * middle * (1 + dot) < limit * limit * (1 - dot))
          limit = middle * Math.sqrt((dot > -1 ? 1 + dot : 0) / (1 - dot));
      } else if (rules.cornering === JUNCTION_DEVIATION) {
        const bound = this.deviationSq(ux, uy, uz, dot, accel, length);
        if (bound < limit) limit = bound;
      } else {
        const bound = this.jerkSq(ux, uy, uz, ue, limitSpeedSq(cruiseSq, cruiseBeforeSq));
        if (bound < limit) limit = bound;
      }
      const easyReach = before[m + EASY_LIMIT] + before[m + EASY_SPAN];
      easyLimit = limit < easyReach ? limit : easyReach;
    } else if (rules.cornering === AXIS_JERK) {
      limit = this.startFromRestSq(ux, uy, uz, ue, cruiseSq);
      easyLimit = limit;
    }

    const records = this.moves;
    const i = this.count++;
    const r = i * RECORD;
    records[r + LENGTH_OF] = length;
    records[r + ACCEL] = accel;
    records[r + CRUISE] = cruiseSq;
    records[r + SPAN] = span;
    records[r + EASY_SPAN] = easySpan;
    records[r + LIMIT] = limit;
    records[r + EASY_LIMIT] = easyLimit;
    this.lays[i] = lays;
    this.added++;
    last[UX] = ux;
    last[UY] = uy;
    last[UZ] = uz;
    last[UE] = ue;
    last[CORNER] = corner;
    this.lastMoves = moves;
    this.hasLast = true;
  }

  /** A full stop: everything held is settled, the next move starts from rest. */
  stop(): void {
    this.settle(true);
    this.hasLast = false;
  }

  /** Junction deviation with the acceleration limited per axis along the change of direction. */
  private deviationSq(ux: number, uy: number, uz: number, dot: number, accel: number, length: number): number {
    const last = this.last;
    if (dot > 0.999999) return Number.POSITIVE_INFINITY;
    if (dot < -0.999999) return 0;
    const rules = this.rules;
    const jx = Math.abs(ux - last[UX]);
    const jy = Math.abs(uy - last[UY]);
    const jz = Math.abs(uz - last[UZ]);
    const norm = Math.sqrt(jx * jx + jy * jy + jz * jz) || 1;
    let a = accel;
    if (rules.maxAccelX * norm < a * jx) a = (rules.maxAccelX * norm) / jx;
    if (rules.maxAccelY * norm < a * jy) a = (rules.maxAccelY * norm) / jy;
    if (rules.maxAccelZ * norm < a * jz) a = (rules.maxAccelZ * norm) / jz;
    const sinHalf = Math.sqrt(0.5 * (1 + dot));
    let bound = (a * rules.cornerFactor * sinHalf) / (1 - sinHalf);
    // Short chords at an obtuse angle are an arc: v² = a·r with r = length/angle.
    if (length < 1 && dot > Math.SQRT1_2) {
      const arc = (length * a) / Math.max(Math.acos(dot), 0.033);
      if (arc < bound) bound = arc;
    }
    return bound;
  }

  /** Per-axis jerk: both directions at one common speed; no axis may jump by more than its own jerk. */
  private jerkSq(ux: number, uy: number, uz: number, ue: number, commonSq: number): number {
    const last = this.last;
    const jerk = this.rules.jerk;
    const v = Math.sqrt(commonSq);
    let factor = 1;
    const x = Math.abs(ux - last[UX]) * v;
    const y = Math.abs(uy - last[UY]) * v;
    const z = Math.abs(uz - last[UZ]) * v;
    const e = Math.abs(ue - last[UE]) * v;
    if (x > jerk.x) factor = Math.min(factor, jerk.x / x);
    if (y > jerk.y) factor = Math.min(factor, jerk.y / y);
    if (z > jerk.z) factor = Math.min(factor, jerk.z / z);
    if (e > jerk.e) factor = Math.min(factor, jerk.e / e);
    return commonSq * factor * factor;
  }

  /** After standstill a move may start at the speed whose axis components equal the jerk. */
  private startFromRestSq(ux: number, uy: number, uz: number, ue: number, cruiseSq: number): number {
    const jerk = this.rules.jerk;
    let v = Math.sqrt(cruiseSq);
    if (Math.abs(ux) * v > jerk.x) v = jerk.x / Math.abs(ux);
    if (Math.abs(uy) * v > jerk.y) v = jerk.y / Math.abs(uy);
    if (Math.abs(uz) * v > jerk.z) v = jerk.z / Math.abs(uz);
    if (Math.abs(ue) * v > jerk.e) v = jerk.e / Math.abs(ue);
    return v * v;
  }

  /** Settles what can no longer change, or with `all` everything, as if the machine came to rest after the newest move. */
  private settle(all: boolean): void {
    const n = this.count;
    if (n === 0) return;
    let settled = this.backwardPass();
    const blocks = this.rules.lookAhead;
    if (all) settled = n;
    else if (blocks < Number.POSITIVE_INFINITY) settled = Math.min(settled, Math.max(n - blocks, 0));
    if (settled === 0 && n >= Planner.windowLimit) {
      settled = n;
      this.forcedStops++;
      this.hasLast = false;
    }
    if (settled > 0) {
      this.forwardPass(settled, blocks);
      this.settled += settled;
      this.onSettled(settled);
      this.dropFirst(settled);
    }
    if (all || this.count === 0) {
      this.forwardEntrySq = 0;
      this.forwardCruiseSq = 0;
    }
    this.threshold = Math.min(this.count * 2 + BATCH, Planner.windowLimit);
    if (this.threshold > this.peakSq.length) this.grow(this.threshold);
  }

  /** Start and peak speeds of all held moves; returns how many of the first are settled for good. */
  private backwardPass(): number {
    const { moves, peakSq } = this;
    let next = 0;
    let easyNext = 0;
    let peak = 0;
    let waiting = 0; // moves since the last one that could gain speed
    let fixed = -1; // newest move that starts at its limit in both budgets
    let settled = 0;
    for (let i = this.count - 1, r = i * RECORD; i >= 0; i--, r -= RECORD) {
      const reach = next + moves[r + SPAN];
      const limit = moves[r + LIMIT];
      const start = limit < reach ? limit : reach;
      const easySpan = moves[r + EASY_SPAN];
      const easyReach = easyNext + easySpan;
      const easyLimit = moves[r + EASY_LIMIT];
      waiting++;
      if (easyLimit < easyReach) {
        if (easyLimit + easySpan > easyNext || waiting > 1) {
          peak = (easyLimit + easyReach) * 0.5;
          if (settled === 0 && i + 2 <= fixed) settled = i + 1;
        }
        const cruise = moves[r + CRUISE];
        let top = (start + reach) * 0.5;
        if (cruise < top) top = cruise;
        if (peak < top) top = peak;
        peakSq[i] = top;
        waiting = 0;
        easyNext = easyLimit;
        if (fixed < 0 && start === limit) fixed = i;
      } else {
        peakSq[i] = -1; // cannot gain speed: takes over the speed of the move before
        easyNext = easyReach;
        if (fixed < 0 && start === limit && easyReach === easyLimit) fixed = i;
      }
      moves[r + START] = start;
      next = start;
    }
    return settled;
  }

  /** Durations of the first `count` moves from their start, peak and end speeds. */
  private forwardPass(count: number, blocks: number): void {
    const { moves, peakSq, timeS } = this;
    const held = this.count;
    const full = blocks === Number.POSITIVE_INFINITY;
    let spanSum = 0;
    if (!full) for (let k = 0; k < Math.min(blocks, held); k++) spanSum += moves[k * RECORD + SPAN];
    let before = this.forwardCruiseSq;
    let entry = full ? 0 : this.forwardEntrySq;
    let lastExitSq = -1;
    let lastExit = 0;
    for (let i = 0, r = 0; i < count; i++, r += RECORD) {
      let top = peakSq[i];
      const start = moves[r + START];
      if (top < 0) top = before < start ? before : start;
      before = top;
      let next = i + 1 < held ? moves[r + RECORD + START] : 0;
      let from = start;
      if (!full) {
        from = i === 0 && this.forwardEntrySq === 0 ? Math.min(start, spanSum) : entry;
        const span = moves[r + SPAN];
        spanSum += (i + blocks < held ? moves[(i + blocks) * RECORD + SPAN] : 0) - span;
        next = Math.max(0, Math.min(next, i + 1 + blocks <= held ? spanSum : next, from + span));
        top = Math.max(from, next, Math.min(top, (from + next + span) * 0.5));
        entry = next;
      }
      if (from > top) from = top;
      if (next > top) next = top;

      const enter = from === lastExitSq ? lastExit : Math.sqrt(from);
      if (from === top && next === top) {
        timeS[i] = moves[r + LENGTH_OF] / enter;
        lastExit = enter;
      } else {
        const cruise = top === from ? enter : Math.sqrt(top);
        const exit = next === top ? cruise : Math.sqrt(next);
        const inverse = 1 / moves[r + ACCEL];
        const rest = moves[r + LENGTH_OF] - (top - from + (top - next)) * 0.5 * inverse;
        timeS[i] = (cruise - enter + (cruise - exit)) * inverse + (rest > 0 ? rest / cruise : 0);
        lastExit = exit;
      }
      lastExitSq = next;
    }
    this.forwardCruiseSq = before;
    this.forwardEntrySq = entry;
  }

  private dropFirst(count: number): void {
    this.moves.copyWithin(0, count * RECORD, this.count * RECORD);
    this.lays.copyWithin(0, count, this.count);
    this.count -= count;
  }

  private grow(capacity: number): void {
    const moves = new Float64Array(capacity * RECORD);
    moves.set(this.moves);
    this.moves = moves;
    this.peakSq = new Float64Array(capacity);
    this.timeS = new Float64Array(capacity);
    const lays = new Uint8Array(capacity);
    lays.set(this.lays);
    this.lays = lays;
  }
}

const limitSpeedSq = (a: number, b: number): number => (a < b ? a : b);

const BATCH = 1024;
/** a displacement below this is none, mm */
const NO_TRAVEL = 1e-9;
const SQUARE_CORNER = 0;
const JUNCTION_DEVIATION = 1;
const AXIS_JERK = 2;
const UX = 0;
const UY = 1;
const UZ = 2;
const UE = 3;
const CORNER = 4;
/** a record of `moves`: squared speeds and spans in mm²/s² */
const RECORD = 8;
const LENGTH_OF = 0;
const ACCEL = 1;
const CRUISE = 2;
const LIMIT = 3;
const SPAN = 4;
const EASY_LIMIT = 5;
const EASY_SPAN = 6;
const START = 7;
