import type { Machine } from "#shared/formats/machine.ts";
import type { CommentFact } from "#shared/gcode/markers.ts";
import type { LineScan } from "#shared/gcode/scan-line.ts";
import type { Findings } from "#shared/layers/findings.ts";
import type { Boundary, Layer, Wait } from "#shared/layers/reading.ts";
import { FILAMENT, LAST_Z, MAX_X, MAX_Y, MIN_X, MIN_Y, RUN_X, RUN_Y, SUMS } from "#shared/layers/sums.ts";
import { Timeline } from "#shared/layers/timeline.ts";
import type { LimitChange, MotionSink } from "#shared/machine/interpreter.ts";
import { FED, newMove, X0, X1, Y0, Y1, Z0, Z1 } from "#shared/machine/move.ts";
import { applyLimits } from "#shared/motion/file-limits.ts";
import { motionRules } from "#shared/motion/motion-rules.ts";
import { Planner } from "#shared/motion/planner.ts";
import { FEEDS, LAYS, TRAVELS } from "#shared/motion/record.ts";
import { Refusal } from "#shared/refusal.ts";

/** More layers than this is no part that this trade prints. */
const MAX_LAYERS = 100_000;
/** Nor does it wait this often: waits and pauses are kept one by one. */
const MAX_WAITS = 1_000_000;
/** Layers found before the first marker that are still taken for the start of the print. */
const START_LAYERS = 2;
/** No layer is thinner than this, µm: where nothing tells the nominal height of a spiral. */
const THINNEST_UM = 50;
/** A run of laying moves whose ends lie this close is a closed loop, mm. */
const LOOP_GAP_MM = 0.6;

/**
 * Cuts the stream of moves into layers. A layer begins at the first laying move (material forward with XY motion) at a
 * Z other than that of the last laying move, and lasts until the next one begins. Heights are compared in whole
 * micrometres. A laying move that rises is not a new layer until the rise exceeds the nominal height (spiral prints;
 * a seam that ramps up stays within its layer). When Z falls, a new object begins.
 */
export class LayerBuilder implements MotionSink {
  /** the line being read, and the file offset of the buffer it stands in */
  readonly scan: LineScan;
  base = 0;
  /** the line being read is the last one and has no terminator but the one lent to it */
  openEnd = false;
  readonly row = newMove();
  readonly layers: Layer[] = [];
  readonly timeline: Timeline;
  readonly planner: Planner;
  /** number of markers so far, and the first disagreement between a marker's height and the layer it names */
  markers = 0;
  markerMismatch: string | undefined;
  spiral = false;
  /** line after the last laying move */
  readonly lastLaid: Boundary = { offset: 0, line: 0, timeS: 0 };
  private waits = 0;
  /** set when a filament diameter is given in the file, mm */
  filamentDiameterMm: number;

  private readonly machine: Machine;
  private readonly findings: Findings;
  /** sums of the open layer, see the places below */
  private readonly sums = new Float64Array(SUMS);
  /** the last laying move: its line, where the next line starts in the buffer (-1 once the buffer is gone) and in the file */
  private laidLine = 0;
  private laidNext = -1;
  private endsAt = 0;
  private current: Layer | undefined;
  private object = 0;
  private zUm = 0;
  private baseUm = 0;
  private nominalUm = 0;
  private statedNominalUm = 0;
  /** whether a run of laying moves is open, and whether the run lies on the part's outline */
  private running = 0;
  private laidSinceTravel = false;
  /** the next laying move begins the print: what was laid before a homing or a temperature wait was its start */
  private startsOver = false;
  private outline = false;
  /** where the layer's marker stands, when one came after the last laying move */
  private mark: { boundary: Boundary; text: string } | undefined;
  private statedTopMm: number | undefined;
  private nozzleC: number | null = null;
  private bedC: number | null = null;

  constructor(machine: Machine, findings: Findings, scan: LineScan) {
    this.scan = scan;
    this.sums[LAST_Z] = Number.NaN;
    this.machine = machine;
    this.findings = findings;
    this.filamentDiameterMm = machine.motion.filamentDiameterMm;
    this.planner = new Planner(machine.motion, (count) => this.timeline.advance(count));
    this.timeline = new Timeline(this.planner);
    this.clearSums();
  }

  move(): void {
    const { row, sums } = this;
    const x = row[X1];
    const y = row[Y1];
    const fed = row[FED];
    const travels = x !== row[X0] || y !== row[Y0];
    if (fed > 0 && travels) {
      const z = row[Z1];
      if (z !== sums[LAST_Z] || row[Z0] !== z) this.considerLayer(row[Z0], z);
      if (this.running === 0) this.beginRun();
      sums[FILAMENT] += fed;
      if (x < sums[MIN_X]) sums[MIN_X] = x;
      if (x > sums[MAX_X]) sums[MAX_X] = x;
      if (y < sums[MIN_Y]) sums[MIN_Y] = y;
      if (y > sums[MAX_Y]) sums[MAX_Y] = y;
      this.laidLine = this.scan.line;
      this.laidNext = this.scan.next;
      if (this.mark !== undefined) this.mark = undefined;
      this.planner.add(row, LAYS);
    } else {
      if (travels) this.leave();
      this.planner.add(row, travels || row[Z0] !== row[Z1] ? TRAVELS : FEEDS);
    }
  }

  private beginRun(): void {
    const { row, sums } = this;
    this.running = 1;
    this.laidSinceTravel = true;
    sums[RUN_X] = row[X0];
    sums[RUN_Y] = row[Y0];
    this.widen(row[X0], row[Y0]);
  }

  /** The nozzle leaves what it laid: a run ends, and before a travel without material a command may stand. */
  private leave(): void {
    const { row } = this;
    if (this.running !== 0) this.endRun(row[X0], row[Y0]);
    if (row[FED] === 0 && this.laidSinceTravel) {
      this.laidSinceTravel = false;
      if (this.current) this.timeline.travel(this.offset(), this.scan.line);
    }
  }

  /** byte at which the line being read starts */
  offset(): number {
    return this.base + this.scan.start;
  }

  /** length of the line being read with its terminator, none at the end of an open file */
  lineBytes(): number {
    return this.scan.next - this.scan.start - (this.openEnd ? 1 : 0);
  }

  /** What is kept by place in the buffer is turned into file offsets before the buffer goes. */
  endBlock(): void {
    if (this.laidNext >= 0) this.endsAt = this.base + this.laidNext - (this.openEnd ? 1 : 0);
    this.laidNext = -1;
  }

  /** A comment that names a layer, states a height or a feature. */
  comment(fact: CommentFact, text: () => string): void {
    if (fact.says === "feature") {
      this.endRun(this.row[X1], this.row[Y1]);
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
    if ((kind === "home" || kind === "temperature") && this.markers === 0 && this.layers.length <= START_LAYERS) {
      this.startsOver = true;
      this.sums[LAST_Z] = Number.NaN;
    }
    if (kind === "dwell" && seconds === 0) return;
    if (++this.waits > MAX_WAITS)
      throw new Refusal(
        "too-many-waits",
        `more than ${MAX_WAITS} dwells, pauses and other waits`,
        "Check that the file is a sliced part.",
        { line: this.scan.line },
      );
    this.current?.waits.push({ kind, line: this.scan.line, seconds });
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
    this.findings.add(code, "warning", message, { line: this.scan.line });
  }

  /** Settles everything; afterwards all layers have their times. */
  end(): void {
    this.planner.stop();
    this.endBlock();
    this.closeLayer(this.endsAt, this.laidLine);
    this.timeline.end();
    this.lastLaid.offset = this.endsAt;
    this.lastLaid.line = this.laidLine + 1;
    this.lastLaid.timeS = this.timeline.lastLaidS;
  }

  private boundary(): Boundary {
    return { offset: this.offset(), line: this.scan.line, timeS: 0 };
  }

  private firstMarker(): void {
    if (this.layers.length === 0) return;
    if (this.layers.length <= START_LAYERS) this.forgetLayers();
    else
      this.findings.add(
        "marker-late",
        "warning",
        `the first layer marker stands after ${this.layers.length} layers; all of them are kept`,
        { line: this.scan.line },
      );
  }

  private forgetLayers(): void {
    this.startsOver = false;
    this.layers.length = 0;
    this.current = undefined;
    this.object = 0;
    this.sums[LAST_Z] = Number.NaN;
    this.running = 0;
    this.clearSums();
    this.timeline.forgetLayers();
  }

  private considerLayer(z0: number, z: number): void {
    if (this.startsOver) this.forgetLayers();
    this.sums[LAST_Z] = z;
    const zUm = Math.round(z * 1000);
    const fromUm = Math.round(z0 * 1000);
    const ramps = fromUm !== zUm;
    if (!this.current) {
      const top = ramps ? Math.max(fromUm, zUm) : zUm;
      this.nominalUm = this.statedNominalUm || (ramps ? Math.max(fromUm, zUm - fromUm, THINNEST_UM) : top);
      this.beginLayer(zUm, 0);
      this.spiral ||= ramps;
      return;
    }
    // Only chords of one arc share a line, and commands stand between lines: a layer is a line at least.
    if (this.current.firstLine === this.scan.line) {
      if (zUm > this.zUm) this.raise(zUm);
      return;
    }
    if (ramps) {
      if (zUm < this.baseUm) this.beginLayer(zUm, 0);
      else if (zUm > this.baseUm + this.ceilingUm()) {
        // Behind a travel it is a seam that ramps up from the layer below.
        this.spiral ||= fromUm === this.zUm && this.running !== 0;
        const below = Math.max(this.baseUm + this.ceilingUm(), this.zUm);
        this.beginLayer(zUm, fromUm < this.zUm ? this.zUm : Math.min(below, zUm - 1));
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
        { line: this.scan.line },
      );
    const falls = this.current === undefined || zUm < this.zUm;
    this.endRun(this.row[X0], this.row[Y0]);
    this.closeLayer(this.offset(), this.scan.line - 1);
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
      firstLine: this.scan.line,
      lastLine: 0,
      firstByte: this.offset(),
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
    this.endRun(this.row[X1], this.row[Y1]);
    layer.lastLine = lastLine;
    layer.endByte = endByte;
    layer.filamentMm = this.sums[FILAMENT];
    layer.volumeMm3 = this.sums[FILAMENT] * Math.PI * (this.filamentDiameterMm / 2) ** 2;
    layer.areaMm2 = layer.heightMm > 0 ? layer.volumeMm3 / layer.heightMm : 0;
    layer.boxMm = { min: [this.sums[MIN_X], this.sums[MIN_Y]], max: [this.sums[MAX_X], this.sums[MAX_Y]] };
    this.clearSums();
  }

  /** Ends a run of laying moves at a point: a closed one may be the part's outline. */
  private endRun(x: number, y: number): void {
    if (this.running === 0) return;
    this.running = 0;
    const gap = Math.hypot(x - this.sums[RUN_X], y - this.sums[RUN_Y]);
    this.timeline.endRun(gap < LOOP_GAP_MM, this.outline);
  }

  private widen(x: number, y: number): void {
    this.sums[MIN_X] = Math.min(this.sums[MIN_X], x);
    this.sums[MAX_X] = Math.max(this.sums[MAX_X], x);
    this.sums[MIN_Y] = Math.min(this.sums[MIN_Y], y);
    this.sums[MAX_Y] = Math.max(this.sums[MAX_Y], y);
  }

  private clearSums(): void {
    this.running = 0;
    this.sums[FILAMENT] = 0;
    this.sums[MIN_X] = Number.POSITIVE_INFINITY;
    this.sums[MIN_Y] = Number.POSITIVE_INFINITY;
    this.sums[MAX_X] = Number.NEGATIVE_INFINITY;
    this.sums[MAX_Y] = Number.NEGATIVE_INFINITY;
  }
}
