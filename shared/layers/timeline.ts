import type { Layer, Travels } from "#shared/layers/reading.ts";
import type { Planner } from "#shared/motion/planner.ts";
import { LAYS, TRAVELS } from "#shared/motion/record.ts";

const RUN = 5;
const STAMP = 0;
const LAYER = 1;
const FORGET = 2;
const TRAVEL = 3;
const DWELL = 4;
const OPEN_LIMIT = 16_384;
/** closest spacing of kept boundaries, s, and growth of the spacing with distance from the layer's nearer border */
const CLOSE_S = 0.05;
const SPREAD = 0.05;

/** Something that wants to know the print time at which it stands. */
export interface Timed {
  timeS: number;
}

/**
 * Turns settled move durations into print time. The reader notes what stands between two moves as an event; the
 * planner settles moves later, in order, and the event then learns its time.
 */
export class Timeline {
  /** print time of all settled moves and dwells, s */
  clockS = 0;
  /** end of the last move that laid material, s */
  lastLaidS = 0;
  readonly travels = new TravelIndex();

  private readonly planner: Planner;
  /** four numbers an event: move it stands before, kind, two arguments */
  private events = new Float64Array(4 * 1024);
  private head = 0;
  private tail = 0;
  private readonly objects = new Map<number, Timed | Layer>();
  private nextObject = 0;
  private layer: Layer | undefined;
  // Of the open layer, and of the open run of laying moves.
  private laidS = 0;
  private travelledMm = 0;
  private depositedMm = 0;
  private outlineMm = 0;
  private longestLoopMm = 0;
  private runMm = 0;

  constructor(planner: Planner) {
    this.planner = planner;
  }

  stamp(target: Timed): void {
    this.note(STAMP, this.keep(target), 0);
  }

  beginLayer(layer: Layer): void {
    this.note(LAYER, this.keep(layer), 0);
  }

  /** What was taken for layers so far belongs to the start of the print. */
  forgetLayers(): void {
    this.note(FORGET, 0, 0);
  }

  travel(offset: number, line: number): void {
    this.note(TRAVEL, offset, line);
  }

  dwell(seconds: number): void {
    this.note(DWELL, seconds, 0);
  }

  /**
   * A run of laying moves ends here.
   *
   * @param closed its end lies at its start
   * @param outline comments say that it lies on the part's outline
   */
  endRun(closed: boolean, outline: boolean): void {
    this.note(RUN, closed ? 1 : 0, outline ? 1 : 0);
  }

  /** Takes the durations of the moves that the planner has just settled. */
  advance(count: number): void {
    const base = this.planner.settled - count;
    let from = 0;
    while (from < count) {
      this.handleUpTo(base + from);
      const to = Math.min(count, this.nextEventMove() - base);
      this.pass(from, to);
      from = to;
    }
  }

  /**
   * Lets the moves [from, to) of the settled batch pass; no event stands between them. Sums go on move by move, so that
   * they are the same to the last bit wherever the moves are cut.
   */
  private pass(from: number, to: number): void {
    const { timeS, lengthMm, kind } = this.planner;
    let clock = this.clockS;
    let lastLaid = this.lastLaidS;
    let laidS = this.laidS;
    let runMm = this.runMm;
    let travelledMm = this.travelledMm;
    for (let i = from; i < to; i++) {
      const t = timeS[i];
      clock += t;
      if (kind[i] === LAYS) {
        laidS += t;
        runMm += lengthMm[i];
        lastLaid = clock;
      } else if (kind[i] === TRAVELS) travelledMm += lengthMm[i];
    }
    this.clockS = clock;
    this.lastLaidS = lastLaid;
    this.laidS = laidS;
    this.runMm = runMm;
    this.travelledMm = travelledMm;
  }

  /** Handles what is left once every move is settled, and closes the last layer at its last laying move. */
  end(): void {
    this.handleUpTo(this.planner.settled);
    this.closeLayer(this.lastLaidS);
    this.layer = undefined;
  }

  private note(kind: number, a: number, b: number): void {
    if (this.tail + 4 > this.events.length) this.makeRoom();
    const { events } = this;
    events[this.tail] = this.planner.added;
    events[this.tail + 1] = kind;
    events[this.tail + 2] = a;
    events[this.tail + 3] = b;
    this.tail += 4;
    if (this.planner.added === this.planner.settled) this.handleUpTo(this.planner.settled);
  }

  private makeRoom(): void {
    if (this.head > this.events.length / 2) {
      this.events.copyWithin(0, this.head, this.tail);
    } else {
      const wider = new Float64Array(this.events.length * 2);
      wider.set(this.events.subarray(this.head, this.tail));
      this.events = wider;
    }
    this.tail -= this.head;
    this.head = 0;
  }

  private keep(target: Timed | Layer): number {
    this.objects.set(this.nextObject, target);
    return this.nextObject++;
  }

  private take(key: number): Timed | Layer {
    const target = this.objects.get(key)!;
    this.objects.delete(key);
    return target;
  }

  private nextEventMove(): number {
    return this.head < this.tail ? this.events[this.head] : Number.POSITIVE_INFINITY;
  }

  private handleUpTo(move: number): void {
    while (this.head < this.tail && this.events[this.head] <= move) {
      const { events, head } = this;
      this.head += 4;
      this.handle(events[head + 1], events[head + 2], events[head + 3]);
    }
    if (this.head === this.tail) {
      this.head = 0;
      this.tail = 0;
    }
  }

  private handle(kind: number, a: number, b: number): void {
    switch (kind) {
      case STAMP:
        (this.take(a) as Timed).timeS = this.clockS;
        return;
      case LAYER:
        this.closeLayer(this.clockS);
        this.layer = this.take(a) as Layer;
        this.layer.startsAtS = this.clockS;
        this.clearSums();
        return;
      case FORGET:
        this.closeLayer(this.clockS);
        this.layer = undefined;
        this.clearSums();
        this.travels.clear();
        return;
      case RUN:
        this.closeRun(a === 1, b === 1);
        return;
      case TRAVEL:
        this.travels.add(a, b, this.clockS);
        return;
      case DWELL:
        this.clockS += a;
        return;
    }
  }

  private closeRun(closed: boolean, outline: boolean): void {
    this.depositedMm += this.runMm;
    if (outline) this.outlineMm += this.runMm;
    if (closed && this.runMm > this.longestLoopMm) this.longestLoopMm = this.runMm;
    this.runMm = 0;
  }

  private clearSums(): void {
    this.laidS = 0;
    this.travelledMm = 0;
    this.depositedMm = 0;
    this.outlineMm = 0;
    this.longestLoopMm = 0;
    this.runMm = 0;
  }

  private closeLayer(atS: number): void {
    if (!this.layer) return;
    this.layer.timeS = Math.max(atS - this.layer.startsAtS, 0);
    this.closeRun(false, false);
    this.layer.extrudingTimeS = this.laidS;
    this.layer.depositedLengthMm = this.depositedMm;
    this.layer.travelLengthMm = this.travelledMm;
    this.layer.outlineMm = this.outlineMm || this.longestLoopMm;
    if (this.outlineMm > 0) this.layer.outlineFrom = "comments";
    this.travels.closeLayer(this.layer.startsAtS, atS);
  }
}

/**
 * Line boundaries before travel moves. Commands that lead a layer are placed near the end of the layer below, and a
 * lamp that is lit climbs at a layer's beginning; so boundaries are kept densely there and thinned by their distance in
 * time from the layer's nearer border: memory grows with layers, not with moves.
 */
class TravelIndex {
  /** all travels of the open layer, as offset, line, time; thinned to every second when full */
  private open: number[] = [];
  private readonly kept: number[] = [];

  add(offset: number, line: number, timeS: number): void {
    this.open.push(offset, line, timeS);
    if (this.open.length >= 3 * OPEN_LIMIT) this.open = everySecond(this.open);
  }

  clear(): void {
    this.open = [];
  }

  closeLayer(startS: number, endS: number): void {
    const { open } = this;
    const keep: number[] = [];
    let lastKeptS = Number.POSITIVE_INFINITY;
    for (let i = open.length - 3; i >= 0; i -= 3) {
      const timeS = open[i + 2];
      const fromBorderS = Math.min(endS - timeS, timeS - startS);
      if (lastKeptS - timeS < Math.max(CLOSE_S, SPREAD * fromBorderS)) continue;
      keep.push(i);
      lastKeptS = timeS;
    }
    for (let k = keep.length - 1; k >= 0; k--) this.kept.push(open[keep[k]], open[keep[k] + 1], open[keep[k] + 2]);
    this.open = [];
  }

  /** The kept boundaries with `fromOffset <= offset < endOffset`. */
  within(fromOffset: number, endOffset: number): Travels {
    const { kept } = this;
    const offset: number[] = [];
    const line: number[] = [];
    const timeS: number[] = [];
    for (let i = 0; i < kept.length; i += 3) {
      if (kept[i] < fromOffset || kept[i] >= endOffset) continue;
      offset.push(kept[i]);
      line.push(kept[i + 1]);
      timeS.push(kept[i + 2]);
    }
    return {
      count: offset.length,
      offset: Float64Array.from(offset),
      line: Float64Array.from(line),
      timeS: Float64Array.from(timeS),
    };
  }
}

function everySecond(triples: number[]): number[] {
  const thinned: number[] = [];
  for (let i = 0; i < triples.length; i += 6) thinned.push(triples[i], triples[i + 1], triples[i + 2]);
  return thinned;
}
