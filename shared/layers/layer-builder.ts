import type { Machine } from "#shared/formats/machine.ts";
import type { CommentFact } from "#shared/gcode/markers.ts";
import type { Findings } from "#shared/layers/findings.ts";
import type { Boundary, Layer, Wait } from "#shared/layers/reading.ts";
import { Timeline } from "#shared/layers/timeline.ts";
import type { LimitChange, MotionSink } from "#shared/machine/interpreter.ts";
import { Move } from "#shared/machine/move.ts";
import { applyLimits } from "#shared/motion/file-limits.ts";
import { motionRules } from "#shared/motion/motion-rules.ts";
import { Planner } from "#shared/motion/planner.ts";
import { Refusal } from "#shared/refusal.ts";

/** More layers than this is no part that this trade prints. */
const MAX_LAYERS = 100_000;
/** Layers found before the first marker that are still taken for the start of the print. */
const START_LAYERS = 2;
/** A run of laying moves whose ends lie this close is a closed loop, mm. */
const LOOP_GAP_MM = 0.6;

/** The line being read: byte offset, line number, offset of the next line. */
export const OFFSET = 0;
export const LINE = 1;
export const NEXT = 2;

/**
 * Cuts the stream of moves into layers. A layer begins at the first laying move (material forward with XY motion) at a
 * Z other than that of the last laying move, and lasts until the next one begins. Heights are compared in whole
 * micrometres. A laying move that rises is not a new layer until the rise exceeds the nominal height (spiral prints;
 * a seam that ramps up stays within its layer). When Z falls, a new object begins.
 */
export class LayerBuilder implements MotionSink {
  readonly where = new Float64Array(3);
  readonly next = new Move();
  readonly layers: Layer[] = [];
  readonly timeline: Timeline;
  readonly planner: Planner;
  /** number of markers so far, and the first disagreement between a marker's height and the layer it names */
  markers = 0;
  markerMismatch: string | undefined;
  spiral = false;
  /** line after the last laying move */
  readonly lastLaid: Boundary = { offset: 0, line: 0, timeS: 0 };
  layingMoves = 0;
  /** set when a filament diameter is given in the file, mm */
  filamentDiameterMm: number;

  private readonly machine: Machine;
  private readonly findings: Findings;
  // Sums of the open layer. They start as NaN or Infinity so that they are stored as doubles from the beginning.
  private depositedMm = Number.NaN;
  private travelMm = Number.NaN;
  private filamentMm = Number.NaN;
  private outlineMm = Number.NaN;
  private loopMm = Number.NaN;
  private minX = Number.POSITIVE_INFINITY;
  private maxX = Number.NEGATIVE_INFINITY;
  private minY = Number.POSITIVE_INFINITY;
  private maxY = Number.NEGATIVE_INFINITY;
  /** length and start of the open run of laying moves */
  private runMm = Number.NaN;
  private runX = Number.NaN;
  private runY = Number.NaN;
  /** raw Z of the last laying move, to leave the common case at once */
  private lastZ = Number.NaN;
  /** byte and line behind the last laying move */
  private endsAt = Number.NaN;
  private endsLine = 0;
  private current: Layer | undefined;
  private object = 0;
  private zUm = 0;
  private baseUm = 0;
  private nominalUm = 0;
  private statedNominalUm = 0;
  /** whether a run of laying moves is open, and whether the run lies on the part's outline */
  private running = 0;
  private laidSinceTravel = false;
  private outline = false;
  private outlineSeen = false;
  /** where the layer's marker stands, when one came after the last laying move */
  private mark: { boundary: Boundary; text: string } | undefined;
  private statedTopMm: number | undefined;
  private nozzleC: number | null = null;
  private bedC: number | null = null;

  constructor(machine: Machine, findings: Findings) {
    this.machine = machine;
    this.findings = findings;
    this.filamentDiameterMm = machine.motion.filamentDiameterMm;
    this.planner = new Planner(machine.motion, (count) => this.timeline.advance(count));
    this.timeline = new Timeline(this.planner);
    this.clearSums();
  }

  move(): void {
    const { next } = this;
    const { x0, y0, x1: x, y1: y, z1: z, fedMm: de, lengthMm } = next;
    let lays = 0;
    if (de > 0 && (x !== x0 || y !== y0)) {
      if (z !== this.lastZ || next.z0 !== z) this.considerLayer(next.z0, z);
      lays = 1;
      if (this.running === 0) {
        this.running = 1;
        this.laidSinceTravel = true;
        this.runX = x0;
        this.runY = y0;
        this.runMm = 0;
        this.widen(x0, y0);
      }
      this.runMm += lengthMm;
      this.filamentMm += de;
      if (x < this.minX) this.minX = x;
      if (x > this.maxX) this.maxX = x;
      if (y < this.minY) this.minY = y;
      if (y > this.maxY) this.maxY = y;
      this.endsAt = this.where[NEXT];
      this.endsLine = this.where[LINE] + 1;
      this.mark = undefined;
    } else if (lengthMm > 0) {
      this.travelMm += lengthMm;
      if (this.running !== 0) this.endRun(x0, y0);
      if (de === 0 && this.laidSinceTravel) {
        this.laidSinceTravel = false;
        if (this.current) this.timeline.travel(this.where[OFFSET], this.where[LINE]);
      }
    }
    this.planner.add(next, lays);
  }

  /** A comment that names a layer, states a height or a feature. */
  comment(fact: CommentFact, text: () => string): void {
    if (fact.says === "feature") {
      this.endRun(this.next.x1, this.next.y1);
      this.outline = fact.outline === true;
      return;
    }
    if (fact.heightMm !== undefined && fact.heightMm > 0) this.statedNominalUm = Math.round(fact.heightMm * 1000);
    if (fact.topMm !== undefined) this.statedTopMm = fact.topMm;
    if (fact.says !== "layer") return;
    if (fact.topMm === undefined) this.statedTopMm = undefined;
    this.markers++;
    if (this.markers === 1) this.firstMarker();
    if (!this.mark) {
      const boundary = this.boundary();
      this.timeline.stamp(boundary);
      this.mark = { boundary, text: text() };
    }
  }

  wait(kind: Wait["kind"], seconds: number | null): void {
    this.planner.stop();
    if (seconds !== null && seconds > 0) this.timeline.dwell(seconds);
    if ((kind === "home" || kind === "temperature") && this.markers === 0 && this.layers.length <= START_LAYERS)
      this.forgetLayers();
    if (kind === "dwell" && seconds === 0) return;
    this.current?.waits.push({ kind, line: this.where[LINE], seconds });
  }

  nozzle(celsius: number): void {
    this.nozzleC = celsius;
  }

  bed(celsius: number): void {
    this.bedC = celsius;
  }

  limits(change: LimitChange): void {
    const { motion } = this.machine;
    if (!motion.honourFileLimits) return;
    this.planner.setRules(applyLimits(this.planner.currentRules, motionRules(motion), change));
  }

  odd(code: string, message: string): void {
    this.findings.add(code, "warning", message, { line: this.where[LINE] });
  }

  /** Settles everything; afterwards all layers have their times. */
  end(): void {
    this.planner.stop();
    const [endOffset, endLine] = [this.endsAt, this.endsLine];
    this.closeLayer(endOffset, endLine - 1);
    this.timeline.end();
    this.lastLaid.offset = endOffset;
    this.lastLaid.line = endLine;
    this.lastLaid.timeS = this.timeline.lastLaidS;
  }

  private boundary(): Boundary {
    return { offset: this.where[OFFSET], line: this.where[LINE], timeS: 0 };
  }

  private firstMarker(): void {
    if (this.layers.length === 0) return;
    if (this.layers.length <= START_LAYERS) this.forgetLayers();
    else
      this.findings.add(
        "marker-late",
        "warning",
        `the first layer marker stands after ${this.layers.length} layers; all of them are kept`,
        { line: this.where[LINE] },
      );
  }

  private forgetLayers(): void {
    this.layers.length = 0;
    this.current = undefined;
    this.object = 0;
    this.lastZ = Number.NaN;
    this.running = 0;
    this.clearSums();
    this.timeline.forgetLayers();
  }

  private considerLayer(z0: number, z: number): void {
    this.lastZ = z;
    this.layingMoves++;
    const zUm = Math.round(z * 1000);
    const fromUm = Math.round(z0 * 1000);
    const ramps = fromUm !== zUm;
    if (!this.current) {
      const top = ramps ? Math.max(fromUm, zUm) : zUm;
      this.nominalUm = this.statedNominalUm || (ramps ? Math.max(fromUm, 1) : top);
      this.beginLayer(zUm, 0);
      this.spiral ||= ramps;
      return;
    }
    if (ramps) {
      if (zUm < this.baseUm) this.beginLayer(zUm, 0);
      else if (zUm > this.baseUm + this.ceilingUm()) {
        this.spiral ||= fromUm === this.zUm;
        this.beginLayer(zUm, fromUm < this.zUm ? this.zUm : Math.min(this.baseUm + this.ceilingUm(), zUm - 1));
      } else if (zUm > this.zUm) this.raise(zUm);
      return;
    }
    if (zUm === this.zUm) return;
    if (zUm < this.zUm) {
      this.beginLayer(zUm, 0);
      return;
    }
    this.nominalUm = zUm - this.zUm;
    this.beginLayer(zUm, this.zUm);
  }

  private ceilingUm(): number {
    return this.statedNominalUm || this.nominalUm;
  }

  private raise(zUm: number): void {
    this.zUm = zUm;
    this.current!.zMm = zUm / 1000;
    this.current!.heightMm = (zUm - this.baseUm) / 1000;
  }

  private beginLayer(zUm: number, baseUm: number): void {
    if (this.layers.length >= MAX_LAYERS)
      throw new Refusal(
        "too-many-layers",
        `more than ${MAX_LAYERS} layers`,
        "Check that the file is a sliced part and not a continuous carving path.",
        { line: this.where[LINE] },
      );
    const falls = this.current === undefined || zUm < this.zUm;
    this.endRun(this.next.x0, this.next.y0);
    this.closeLayer(this.where[OFFSET], this.where[LINE] - 1);
    if (falls) this.object++;
    this.zUm = zUm;
    this.baseUm = falls ? 0 : baseUm;
    if (falls && this.current) this.nominalUm = zUm;
    const layer = this.newLayer();
    this.layers.push(layer);
    this.current = layer;
    this.timeline.beginLayer(layer);
    this.checkMarker(layer);
  }

  private newLayer(): Layer {
    const { mark } = this;
    let writeAt = mark?.boundary;
    if (!writeAt) {
      writeAt = this.boundary();
      this.timeline.stamp(writeAt);
    }
    return {
      index: this.layers.length + 1,
      object: this.object,
      zMm: this.zUm / 1000,
      heightMm: (this.zUm - this.baseUm) / 1000,
      firstLine: this.where[LINE],
      lastLine: 0,
      firstByte: this.where[OFFSET],
      endByte: 0,
      startsAtS: 0,
      timeS: 0,
      extrudingTimeS: 0,
      depositedLengthMm: 0,
      travelLengthMm: 0,
      filamentMm: 0,
      volumeMm3: 0,
      areaMm2: 0,
      outlineMm: 0,
      outlineFrom: "geometry",
      boxMm: { min: [0, 0], max: [0, 0] },
      nozzleC: this.nozzleC,
      bedC: this.bedC,
      duty: {},
      waits: [],
      writeAt,
      ...(mark ? { marker: mark.text } : {}),
    };
  }

  /** Markers are the cross-check: the first one whose height differs from the layer it announces is a finding. */
  private checkMarker(layer: Layer): void {
    const stated = this.statedTopMm;
    if (stated === undefined || this.markerMismatch || !this.mark || this.spiral) return;
    if (Math.abs(stated - layer.zMm) > 0.0015)
      this.markerMismatch = `the marker of layer ${layer.index} (line ${this.mark.boundary.line}) states ${stated} mm, material is laid at ${layer.zMm} mm`;
  }

  private closeLayer(endByte: number, lastLine: number): void {
    const layer = this.current;
    if (!layer) {
      this.clearSums();
      return;
    }
    this.endRun(this.next.x1, this.next.y1);
    layer.lastLine = lastLine;
    layer.endByte = endByte;
    layer.depositedLengthMm = this.depositedMm;
    layer.travelLengthMm = this.travelMm;
    layer.filamentMm = this.filamentMm;
    layer.volumeMm3 = this.filamentMm * Math.PI * (this.filamentDiameterMm / 2) ** 2;
    layer.areaMm2 = layer.heightMm > 0 ? layer.volumeMm3 / layer.heightMm : 0;
    layer.boxMm = { min: [this.minX, this.minY], max: [this.maxX, this.maxY] };
    const commented = this.outlineSeen && this.outlineMm > 0;
    layer.outlineFrom = commented ? "comments" : "geometry";
    layer.outlineMm = commented ? this.outlineMm : this.loopMm || boxPerimeterMm(layer);
    this.clearSums();
  }

  /** Ends a run of laying moves at a point: a closed one may be the part's outline. */
  private endRun(x: number, y: number): void {
    if (this.running === 0) return;
    this.running = 0;
    this.depositedMm += this.runMm;
    if (this.outline) {
      this.outlineSeen = true;
      this.outlineMm += this.runMm;
    }
    const gap = Math.hypot(x - this.runX, y - this.runY);
    if (gap < LOOP_GAP_MM && this.runMm > this.loopMm && this.runMm > 4 * LOOP_GAP_MM) this.loopMm = this.runMm;
  }

  private widen(x: number, y: number): void {
    this.minX = Math.min(this.minX, x);
    this.maxX = Math.max(this.maxX, x);
    this.minY = Math.min(this.minY, y);
    this.maxY = Math.max(this.maxY, y);
  }

  private clearSums(): void {
    this.running = 0;
    this.depositedMm = 0;
    this.travelMm = 0;
    this.filamentMm = 0;
    this.outlineMm = 0;
    this.loopMm = 0;
    this.minX = Number.POSITIVE_INFINITY;
    this.minY = Number.POSITIVE_INFINITY;
    this.maxX = Number.NEGATIVE_INFINITY;
    this.maxY = Number.NEGATIVE_INFINITY;
  }
}

const boxPerimeterMm = ({ boxMm: { min, max } }: Layer): number => 2 * (max[0] - min[0] + max[1] - min[1]);
