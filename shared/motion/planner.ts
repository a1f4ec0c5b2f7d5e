import type { Motion } from "#shared/formats/machine.ts";
import { FED, SPEED as MOVE_SPEED, X0, X1, Y0, Y1, Z0, Z1 } from "#shared/machine/move.ts";
import { type MotionRules, motionRules } from "#shared/motion/motion-rules.ts";
import { deviationCornerSq, jerkCornerSq, limitByAxes, startFromRestSq } from "#shared/motion/move-limits.ts";
import {
  ACCEL,
  AXIS_JERK,
  CRUISE,
  DE,
  DX,
  DY,
  DZ,
  EASY_LIMIT,
  EASY_SPAN,
  JUNCTION_DEVIATION,
  LAST_CORNER,
  LAST_EASY_LIMIT,
  LAST_LIMIT,
  LENGTH,
  LIMIT,
  NO_TRAVEL,
  RECORD,
  SPAN,
  SPEED,
  SQUARE_CORNER,
  START,
} from "#shared/motion/record.ts";

/** moves between two settlings */
const BATCH = 512;

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
  /**
   * The moves just settled: duration, s, length (of the material for a move of material alone), mm, and kind. Valid during `onSettled` only.
   */
  timeS = new Float64Array(0);
  lengthMm = new Float64Array(0);
  kind = new Uint8Array(0);
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
  private records = new Float64Array(0);
  private peakSq = new Float64Array(0);
  /** how many of the moves held have their limits */
  private prepared = 0;
  /** the last prepared move: displacement, material and length (see the record), its corner factor, and what it lets the next start with */
  private readonly last = new Float64Array(9);
  private readonly limited = new Float64Array(2);
  private lastSpan = 0;
  private lastEasySpan = 0;
  private lastMoves = false;
  private hasLast = false;
  /** state of the forward pass across batches; nothing before the first move limits it */
  private forwardCruiseSq = Number.POSITIVE_INFINITY;
  private forwardEntrySq = 0;

  /** @param onSettled called with the number of moves whose durations now stand in `timeS` */
  constructor(motion: Motion, onSettled: (count: number) => void) {
    this.rules = motionRules(motion);
    this.onSettled = onSettled;
    this.grow(2 * BATCH);
  }

  /** New limits for the moves to come (a file's own acceleration commands, where the machine honours them). */
  setRules(rules: MotionRules): void {
    this.prepare();
    this.rules = rules;
  }

  get currentRules(): MotionRules {
    return this.rules;
  }

  /**
   * Adds one straight move.
   *
   * @param row the move, see machine/move.ts
   * @param kind LAYS, TRAVELS or FEEDS (material alone)
   */
  add(row: Float64Array, kind: number): void {
    if (this.count === this.threshold) this.settle(false);
    const { records } = this;
    const i = this.count++;
    const r = i * RECORD;
    records[r + DX] = row[X1] - row[X0];
    records[r + DY] = row[Y1] - row[Y0];
    records[r + DZ] = row[Z1] - row[Z0];
    records[r + DE] = row[FED];
    records[r + SPEED] = row[MOVE_SPEED];
    this.kind[i] = kind;
    this.added++;
  }

  /** Limits of the moves added since the last time: cruise speed, spans and the two start limits at each corner. */
  private prepare(): void {
    const { records, rules, last, limited } = this;
    const { maxSpeed, printAccel, travelAccel, retractAccel, limitsEveryMove, cornering, stopAtExtrudeOnly } = rules;
    const { cornerFactor, easyFactor, extruderStepSq } = rules;
    const square = cornering === SQUARE_CORNER;
    const retractSpeed = rules.maxSpeedE < Number.POSITIVE_INFINITY ? rules.maxSpeedE : maxSpeed;
    let lastX = last[DX];
    let lastY = last[DY];
    let lastZ = last[DZ];
    let lastE = last[DE];
    let lastLength = last[LENGTH];
    let lastCruiseSq = last[CRUISE];
    let lastCorner = last[LAST_CORNER];
    let lastLimit = last[LAST_LIMIT];
    let lastEasyLimit = last[LAST_EASY_LIMIT];
    let lastSpan = this.lastSpan;
    let lastEasySpan = this.lastEasySpan;
    let lastMoves = this.lastMoves;
    let hasLast = this.hasLast;

    const end = this.count * RECORD;
    for (let r = this.prepared * RECORD; r < end; r += RECORD) {
      const dx = records[r + DX];
      const dy = records[r + DY];
      const dz = records[r + DZ];
      const de = records[r + DE];
      const programmed = records[r + SPEED];
      let length = Math.sqrt(dx * dx + dy * dy + dz * dz);
      const moves = length > NO_TRAVEL;

      let baseAccel = de !== 0 ? printAccel : travelAccel;
      let speed = programmed < maxSpeed ? programmed : maxSpeed;
      let accel = baseAccel;
      if (!moves) {
        length = de < 0 ? -de : de;
        baseAccel = retractAccel;
        accel = baseAccel < rules.maxAccelE ? baseAccel : rules.maxAccelE;
        speed = programmed < retractSpeed ? programmed : retractSpeed;
      } else if (dz !== 0 || de < 0 || limitsEveryMove) {
        limitByAxes(rules, dx, dy, dz, de, length, speed, accel, limited);
        speed = limited[0];
        accel = limited[1];
      }
      const cruiseSq = speed * speed;
      const span = 2 * accel * length;
      const easy = baseAccel * easyFactor * length;
      const easySpan = easy < span ? easy : span;
      const corner = accel === baseAccel ? cornerFactor : cornerFactor * (accel / baseAccel);

      let limit = 0;
      let easyLimit = 0;
      if (hasLast && ((moves && lastMoves) || !stopAtExtrudeOnly)) {
        limit = cruiseSq < lastCruiseSq ? cruiseSq : lastCruiseSq;
        const reach = lastLimit + lastSpan;
        if (reach < limit) limit = reach;
        // Directions are compared without a division: everything below is multiplied by both lengths.
        const lengths = length * lastLength;
        // Moves of material alone point along an axis of their own.
        let dot = 0;
        if (moves && lastMoves) dot = dx * lastX + dy * lastY + dz * lastZ;
        else if (!moves && !lastMoves) dot = de * lastE;
        if (square) {
          if (moves) {
            const step = de * lastLength - lastE * length;
            const stepSq = step * step;
            const allowedSq = extruderStepSq * lengths * lengths;
            if (allowedSq < limit * stepSq) limit = allowedSq / stepSq;
          }
          // Each bound is computed only where it is the lower one, which its square tells without a root.
          const lower = corner < lastCorner ? corner : lastCorner;
          const sum = lower + limit;
          const along = lengths + dot;
          if (along * sum * sum < 2 * limit * limit * lengths) {
            const sinHalf = Math.sqrt(along > 0 ? (0.5 * along) / lengths : 0);
            limit = (lower * sinHalf) / (1 - sinHalf);
          }
          const middle = 0.25 * (span < lastSpan ? span : lastSpan);
          const against = lengths - dot;
          if (middle * middle * along < limit * limit * against)
            limit = middle * Math.sqrt((along > 0 ? along : 0) / against);
        } else {
          const [ux, uy, uz, ue] = [dx / length, dy / length, dz / length, de / length];
          const [vx, vy, vz, ve] = [lastX / lastLength, lastY / lastLength, lastZ / lastLength, lastE / lastLength];
          const bound =
            cornering === JUNCTION_DEVIATION
              ? deviationCornerSq(rules, [ux - vx, uy - vy, uz - vz], dot / lengths, accel, length)
              : jerkCornerSq(rules, [ux - vx, uy - vy, uz - vz, ue - ve], Math.min(cruiseSq, lastCruiseSq));
          if (bound < limit) limit = bound;
        }
        const easyReach = lastEasyLimit + lastEasySpan;
        easyLimit = limit < easyReach ? limit : easyReach;
      } else if (cornering === AXIS_JERK) {
        limit = startFromRestSq(rules, [dx / length, dy / length, dz / length, de / length], cruiseSq);
        easyLimit = limit;
      }

      records[r + LIMIT] = limit;
      records[r + SPAN] = span;
      records[r + EASY_LIMIT] = easyLimit;
      records[r + EASY_SPAN] = easySpan;
      records[r + LENGTH] = length;
      records[r + CRUISE] = cruiseSq;
      records[r + ACCEL] = accel;
      lastX = dx;
      lastY = dy;
      lastZ = dz;
      lastE = de;
      lastLength = length;
      lastCruiseSq = cruiseSq;
      lastCorner = corner;
      lastSpan = span;
      lastEasySpan = easySpan;
      lastLimit = limit;
      lastEasyLimit = easyLimit;
      lastMoves = moves;
      hasLast = true;
    }
    this.prepared = this.count;
    last[DX] = lastX;
    last[DY] = lastY;
    last[DZ] = lastZ;
    last[DE] = lastE;
    last[LENGTH] = lastLength;
    last[CRUISE] = lastCruiseSq;
    last[LAST_CORNER] = lastCorner;
    last[LAST_LIMIT] = lastLimit;
    last[LAST_EASY_LIMIT] = lastEasyLimit;
    this.lastSpan = lastSpan;
    this.lastEasySpan = lastEasySpan;
    this.lastMoves = lastMoves;
    this.hasLast = hasLast;
  }

  /** A full stop: everything held is settled, the next move starts from rest. */
  stop(): void {
    this.settle(true);
    this.hasLast = false;
  }

  /** Settles what can no longer change, or with `all` everything, as if the machine came to rest after the newest move. */
  private settle(all: boolean): void {
    const n = this.count;
    if (n === 0) return;
    this.prepare();
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
      this.forwardCruiseSq = Number.POSITIVE_INFINITY;
    }
    this.threshold = Math.min(this.count * 2 + BATCH, Planner.windowLimit);
    if (this.threshold > this.peakSq.length) this.grow(this.threshold);
  }

  /** Start and peak speeds of all held moves; returns how many of the first are settled for good. */
  private backwardPass(): number {
    const { records, peakSq } = this;
    let next = 0;
    let easyNext = 0;
    let peak = 0;
    let waiting = 0; // moves since the last one that could gain speed
    let fixed = -1; // newest move that starts at its limit in both budgets
    let settled = 0;
    for (let i = this.count - 1, r = i * RECORD; i >= 0; i--, r -= RECORD) {
      const reach = next + records[r + SPAN];
      const limit = records[r + LIMIT];
      const start = limit < reach ? limit : reach;
      const easySpan = records[r + EASY_SPAN];
      const easyReach = easyNext + easySpan;
      const easyLimit = records[r + EASY_LIMIT];
      waiting++;
      if (easyLimit < easyReach) {
        if (easyLimit + easySpan > easyNext || waiting > 1) {
          peak = (easyLimit + easyReach) * 0.5;
          if (settled === 0 && i + 2 <= fixed) settled = i + 1;
        }
        const cruise = records[r + CRUISE];
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
      records[r + START] = start;
      next = start;
    }
    return settled;
  }

  /** Durations of the first `count` moves from their start, peak and end speeds. */
  private forwardPass(count: number, blocks: number): void {
    const { records, peakSq, timeS, lengthMm } = this;
    const held = this.count;
    const full = blocks === Number.POSITIVE_INFINITY;
    let spanSum = 0;
    if (!full) for (let k = 0; k < Math.min(blocks, held); k++) spanSum += records[k * RECORD + SPAN];
    let before = this.forwardCruiseSq;
    let entry = full ? 0 : this.forwardEntrySq;
    let lastExitSq = -1;
    let lastExit = 0;
    let lastAccel = -1;
    let inverse = 0;
    for (let i = 0, r = 0; i < count; i++, r += RECORD) {
      let top = peakSq[i];
      const start = records[r + START];
      if (top < 0) top = before < start ? before : start;
      before = top;
      let next = i + 1 < held ? records[r + RECORD + START] : 0;
      let from = start;
      if (!full) {
        from = i === 0 && this.forwardEntrySq === 0 ? Math.min(start, spanSum) : entry;
        const span = records[r + SPAN];
        spanSum += (i + blocks < held ? records[(i + blocks) * RECORD + SPAN] : 0) - span;
        next = Math.max(0, Math.min(next, i + 1 + blocks <= held ? spanSum : next, from + span));
        top = Math.min(top, (from + next + span) * 0.5);
        entry = next;
      }
      if (from > top) from = top;
      if (next > top) next = top;

      const enter = from === lastExitSq ? lastExit : Math.sqrt(from);
      const length = records[r + LENGTH];
      lengthMm[i] = length;
      if (from === top && next === top) {
        timeS[i] = enter > 0 ? length / enter : 0;
        lastExit = enter;
      } else {
        const cruise = top === from ? enter : Math.sqrt(top);
        const exit = next === top ? cruise : Math.sqrt(next);
        const accel = records[r + ACCEL];
        if (accel !== lastAccel) {
          lastAccel = accel;
          inverse = 1 / accel;
        }
        const rest = length - (top - from + (top - next)) * 0.5 * inverse;
        timeS[i] = (cruise - enter + (cruise - exit)) * inverse + (rest > 0 ? rest / cruise : 0);
        lastExit = exit;
      }
      lastExitSq = next;
    }
    this.forwardCruiseSq = before;
    this.forwardEntrySq = entry;
  }

  private dropFirst(count: number): void {
    this.records.copyWithin(0, count * RECORD, this.count * RECORD);
    this.kind.copyWithin(0, count, this.count);
    this.count -= count;
    this.prepared -= count;
  }

  private grow(capacity: number): void {
    const records = new Float64Array(capacity * RECORD);
    records.set(this.records);
    this.records = records;
    this.peakSq = new Float64Array(capacity);
    this.timeS = new Float64Array(capacity);
    this.lengthMm = new Float64Array(capacity);
    const kind = new Uint8Array(capacity);
    kind.set(this.kind);
    this.kind = kind;
  }
}
