import type { Machine, Motion } from "#shared/formats/machine.ts";
import {
  A,
  A_BIT,
  E,
  E_BIT,
  F,
  F_BIT,
  G_BIT,
  I,
  I_BIT,
  J,
  J_BIT,
  K,
  K_BIT,
  L_BIT,
  M_BIT,
  N_BIT,
  P,
  P_BIT,
  R,
  R_BIT,
  S,
  S_BIT,
  T,
  T_BIT,
  X,
  X_BIT,
  Y,
  Y_BIT,
  Z,
  Z_BIT,
} from "#shared/gcode/letters.ts";
import type { LineScan } from "#shared/gcode/scan-line.ts";
import { type Arc, arcFromCentre, arcFromRadius, arcLengthMm } from "#shared/machine/arc.ts";
import { FED, SPEED, X0, X1, Y0, Y1, Z0, Z1 } from "#shared/machine/move.ts";
import { AT_E, FLOW, newProgram, UNIT, ZERO_X } from "#shared/machine/program.ts";

const INCH = 25.4;
/** No machine moves this far or this fast; a damaged file may say so. A plain move's nine digits never reach it. */
const LARGEST = 1e9;
/** An arc is never cut finer than this, whatever radius a damaged file states. */
const MAX_CHORDS = 100_000;

/** What a line of words turns into. One receiver, so that the calls stay cheap. */
export interface MotionSink {
  /** the row that the interpreter fills (see move.ts), and the call that says it is filled */
  readonly row: Float64Array;
  move(): void;
  /** the queue runs empty: homing, dwell, tool change, wait */
  wait(kind: "temperature" | "home" | "tool" | "pause" | "dwell", seconds: number | null): void;
  nozzle(celsius: number): void;
  bed(celsius: number): void;
  limits(change: LimitChange): void;
  odd(code: string, message: string): void;
}

/** Motion limits that a file sets for itself; mm/s, mm/s². */
export interface LimitChange {
  printAccel?: number;
  travelAccel?: number;
  retractAccel?: number;
  maxSpeed?: number;
  squareCorner?: number;
  cruiseRatio?: number;
  deviation?: number;
  axisSpeed?: Partial<Record<"x" | "y" | "z" | "e", number>>;
  axisAccel?: Partial<Record<"x" | "y" | "z" | "e", number>>;
  jerk?: Partial<Record<"x" | "y" | "z" | "e", number>>;
}

const AXIS_WORDS = X_BIT | Y_BIT | Z_BIT | E_BIT | I_BIT | J_BIT | K_BIT | R_BIT;
const MEASURES = [X, Y, Z, E, A, F, I, J, K, R, P, S];

/** Modal state of the program: words in, moves in absolute millimetres out. */
export class Interpreter {
  private readonly sink: MotionSink;
  private readonly row: Float64Array;
  private readonly motion: Motion;
  private readonly program = newProgram();
  private absolute = true;
  private extruderAbsolute = true;
  /** E words are absolute: see extruderMode */
  private absoluteE = true;
  private feedFactor = 1;
  /** programmed speed before the override */
  private feedMmMin: number;
  private plane: 17 | 18 | 19 = 17;
  private motionWord = 0;
  private retracted = false;

  constructor(machine: Machine, sink: MotionSink) {
    this.motion = machine.motion;
    this.sink = sink;
    this.row = sink.row;
    this.feedMmMin = machine.motion.initialSpeedMmS * 60;
    this.updateSpeed();
  }

  /** Runs one line of words. Output commands (M106 …) are not looked at here. */
  run(scan: LineScan): void {
    if (scan.plain) {
      if (this.motionWord !== 1) this.motionWord = 1;
      this.straight(scan.value, scan.mask);
    } else this.command(scan);
  }

  private straight(value: Float64Array, mask: number): void {
    const { row, program } = this;
    const unit = program[UNIT];
    if ((mask & F_BIT) !== 0) this.setFeed(value[F]);
    const x0 = row[X1];
    const y0 = row[Y1];
    const z0 = row[Z1];
    let x = x0;
    let y = y0;
    let z = z0;
    if (this.absolute) {
      if ((mask & X_BIT) !== 0) x = value[X] * unit + program[ZERO_X];
      if ((mask & Y_BIT) !== 0) y = value[Y] * unit + program[ZERO_X + 1];
      if ((mask & Z_BIT) !== 0) z = value[Z] * unit + program[ZERO_X + 2];
    } else {
      if ((mask & X_BIT) !== 0) x += value[X] * unit;
      if ((mask & Y_BIT) !== 0) y += value[Y] * unit;
      if ((mask & Z_BIT) !== 0) z += value[Z] * unit;
    }
    let fed = 0;
    if ((mask & E_BIT) !== 0) {
      fed = value[E] * unit;
      if (this.absoluteE) {
        const e = fed;
        fed -= program[AT_E];
        program[AT_E] = e;
      } else program[AT_E] += fed;
      fed *= program[FLOW];
    }
    row[X0] = x0;
    row[Y0] = y0;
    row[Z0] = z0;
    row[X1] = x;
    row[Y1] = y;
    row[Z1] = z;
    row[FED] = fed;
    if (fed !== 0 || isTravel(x - x0, y - y0, z - z0)) this.sink.move();
  }

  private setFeed(value: number): void {
    if (value > 0) {
      this.feedMmMin = value * this.program[UNIT];
      this.updateSpeed();
    } else this.sink.odd("feed-not-positive", `F${value} is no feed rate; the one before it stays in force`);
  }

  private updateSpeed(): void {
    this.row[SPEED] = (this.feedMmMin * this.feedFactor) / 60;
  }

  /** E is absolute where M82 says so; whether G91 makes it relative too depends on the firmware family. */
  private extruderMode(): void {
    this.absoluteE = this.extruderAbsolute && (this.absolute || this.motion.axisModeSetsExtruder);
  }

  private command(scan: LineScan): void {
    const { value } = scan;
    const mask = scan.mask & ~scan.bare;
    for (const letter of MEASURES)
      if ((mask & (1 << letter)) !== 0 && !(Math.abs(value[letter]) < LARGEST)) {
        this.sink.odd("number-too-large", "a number on this line is far beyond any machine; the line is not counted");
        return;
      }
    if (scan.commands > 1) {
      this.severalCommands(scan, mask);
      return;
    }
    if ((scan.mask & G_BIT) !== 0) this.gCommand(value[6], value, mask, scan.mask);
    else if ((scan.mask & M_BIT) !== 0) this.mCommand(value[12], value, mask);
    else if ((mask & T_BIT) !== 0) this.tool(value[T]);
    else if ((mask & AXIS_WORDS) !== 0) this.motionCommand(this.motionWord, value, mask);
    else if ((mask & F_BIT) !== 0) this.setFeed(value[F]);
  }

  /** RS274/NGC, 3.8: settings act before the motion of the same line, whatever their order in it. */
  private severalCommands(scan: LineScan, mask: number): void {
    this.sink.odd("several-commands", "several commands on one line: firmware families disagree on which of them run");
    const { value } = scan;
    const isMotion = (g: number): boolean => g >= 0 && g <= 3;
    const words = [...scan.gWords.subarray(0, scan.gCount)];
    for (const g of words) if (!isMotion(g)) this.gCommand(g, value, 0, scan.mask);
    for (const m of scan.mWords.subarray(0, scan.mCount)) this.mCommand(m, value, mask & ~AXIS_WORDS);
    const motion = words.filter(isMotion).pop();
    const onlySettings = words.every((g) => (g >= 17 && g <= 21) || g === 90 || g === 91);
    if (motion !== undefined) this.motionCommand(motion, value, mask);
    else if (onlySettings && (mask & AXIS_WORDS) !== 0) this.motionCommand(this.motionWord, value, mask);
  }

  private gCommand(g: number, value: Float64Array, mask: number, allWords: number): void {
    switch (g) {
      case 0:
      case 1:
      case 2:
      case 3:
        this.motionCommand(g, value, mask);
        return;
      case 4:
        this.dwell(value, mask);
        return;
      case 10:
      case 11:
        // With L or P the line sets tool data, as in RS274/NGC; alone it is a retraction.
        if ((allWords & (L_BIT | P_BIT)) === 0) this.firmwareRetract(g === 10);
        return;
      case 17:
      case 18:
      case 19:
        this.plane = g;
        return;
      case 20:
        this.program[UNIT] = INCH;
        return;
      case 21:
        this.program[UNIT] = 1;
        return;
      case 28:
        this.home(allWords);
        return;
      case 29:
      case 30:
        this.sink.wait("home", null);
        return;
      case 90:
      case 91:
        this.absolute = g === 90;
        if (this.motion.axisModeSetsExtruder) this.extruderAbsolute = g === 90;
        this.extruderMode();
        return;
      case 92:
        this.setPosition(value, allWords);
        return;
    }
  }

  private mCommand(m: number, value: Float64Array, mask: number): void {
    const s = (mask & S_BIT) !== 0 ? value[S] : undefined;
    const temperature = s ?? ((mask & R_BIT) !== 0 ? value[R] : undefined);
    switch (m) {
      case 82:
        this.extruderAbsolute = true;
        this.extruderMode();
        return;
      case 83:
        this.extruderAbsolute = false;
        this.extruderMode();
        return;
      case 104:
      case 109:
        if (temperature !== undefined) this.sink.nozzle(temperature);
        if (m === 109) this.sink.wait("temperature", null);
        return;
      case 140:
      case 190:
        if (temperature !== undefined) this.sink.bed(temperature);
        if (m === 190) this.sink.wait("temperature", null);
        return;
      case 116:
      case 191:
        this.sink.wait("temperature", null);
        return;
      case 400:
        this.sink.wait("dwell", 0);
        return;
      case 220:
        if (s !== undefined && s > 0) this.feedFactor = s / 100;
        this.updateSpeed();
        return;
      case 221:
        if (s !== undefined && s > 0) this.program[FLOW] = s / 100;
        return;
      case 201:
      case 203:
      case 204:
      case 205:
        this.fileLimits(m, value, mask);
        return;
    }
  }

  private fileLimits(m: number, value: Float64Array, mask: number): void {
    const unit = this.program[UNIT];
    const word = (letterBit: number, index: number): number | undefined =>
      (mask & letterBit) !== 0 && value[index] > 0 ? value[index] * unit : undefined;
    const axes = { x: word(X_BIT, X), y: word(Y_BIT, Y), z: word(Z_BIT, Z), e: word(E_BIT, E) };
    if (m === 201) this.sink.limits({ axisAccel: axes });
    else if (m === 203) this.sink.limits({ axisSpeed: axes });
    else if (m === 204) {
      const s = word(S_BIT, S);
      const p = word(P_BIT, P) ?? s;
      const t = word(T_BIT, T) ?? s;
      this.sink.limits({ printAccel: p, travelAccel: t, retractAccel: word(R_BIT, R) });
    } else this.sink.limits({ jerk: axes, deviation: word(J_BIT, J) });
  }

  private dwell(value: Float64Array, mask: number): void {
    let seconds = 0;
    if ((mask & S_BIT) !== 0) seconds = value[S];
    else if ((mask & P_BIT) !== 0) seconds = this.motion.dwellP === "ms" ? value[P] / 1000 : value[P];
    this.sink.wait("dwell", Math.max(seconds, 0));
  }

  private home(words: number): void {
    this.sink.wait("home", null);
    const all = (words & (X_BIT | Y_BIT | Z_BIT)) === 0;
    for (const [axis, letter] of [X_BIT, Y_BIT, Z_BIT].entries())
      if (all || (words & letter) !== 0) {
        this.row[X1 + axis] = 0;
        this.program[ZERO_X + axis] = 0;
      }
  }

  /** A letter without a number is zero; no letter at all is zero for all of them. */
  private setPosition(value: Float64Array, words: number): void {
    const all = (words & ~(G_BIT | N_BIT)) === 0;
    const { row, program } = this;
    const unit = program[UNIT];
    for (const [axis, letter, word] of [
      [0, X_BIT, X],
      [1, Y_BIT, Y],
      [2, Z_BIT, Z],
    ])
      if (all || (words & letter) !== 0) program[ZERO_X + axis] = row[X1 + axis] - (all ? 0 : value[word] * unit);
    const extruder = (words & E_BIT) !== 0 ? E : A;
    if (all || (words & (1 << extruder)) !== 0) program[AT_E] = all ? 0 : value[extruder] * unit;
  }

  private firmwareRetract(retract: boolean): void {
    if (this.retracted === retract) return;
    this.retracted = retract;
    const { lengthMm, speedMmS } = this.motion.firmwareRetract;
    if (lengthMm === 0) return;
    const { row } = this;
    row.copyWithin(X0, X1, X1 + 3);
    row[FED] = retract ? -lengthMm : lengthMm;
    row[SPEED] = speedMmS;
    this.sink.move();
    this.updateSpeed();
  }

  private tool(t: number): void {
    // T255 and T1000 are switches of some firmware, not tools (common practice, no source).
    if (t >= 0 && t < 64) this.sink.wait("tool", null);
  }

  /** Motion off the fast path: arcs, an extruder on axis A, missing G word. */
  private motionCommand(g: number, value: Float64Array, given: number): void {
    let mask = given;
    if ((mask & A_BIT) !== 0 && (mask & E_BIT) === 0) {
      value[E] = value[A];
      mask |= E_BIT;
    }
    this.motionWord = g;
    if (g < 2) this.straight(value, mask);
    else this.arc(g === 2, value, mask);
  }

  private arc(clockwise: boolean, value: Float64Array, mask: number): void {
    const { row, program } = this;
    const unit = program[UNIT];
    // first and second axis of the plane, the axis along it, and their centre words
    const axes = this.plane === 17 ? [0, 1, 2] : this.plane === 18 ? [2, 0, 1] : [1, 2, 0];
    const words = [X, Y, Z];
    const bits = [X_BIT, Y_BIT, Z_BIT];
    const from = axes.map((axis) => row[X1 + axis]);
    const to = axes.map((axis, k) => {
      if ((mask & bits[axis]) === 0) return from[k];
      return value[words[axis]] * unit + (this.absolute ? program[ZERO_X + axis] : from[k]);
    });
    const [i, j] = axes.map((axis) => ((mask & [I_BIT, J_BIT, K_BIT][axis]) !== 0 ? value[[I, J, K][axis]] * unit : 0));
    const arc =
      (mask & R_BIT) !== 0
        ? arcFromRadius(from[0], from[1], to[0], to[1], value[R] * unit, clockwise)
        : arcFromCentre(from[0], from[1], to[0], to[1], i, j, clockwise);
    if (!arc) {
      this.sink.odd(
        "arc-invalid",
        "this arc has no centre: start and end do not lie on one circle. It is timed as a straight line",
      );
      this.straight(value, mask);
      return;
    }
    if ((mask & F_BIT) !== 0) this.setFeed(value[F]);
    let fed = 0;
    if ((mask & E_BIT) !== 0) {
      const e = value[E] * unit;
      fed = (this.absoluteE ? e - program[AT_E] : e) * program[FLOW];
      program[AT_E] = this.absoluteE ? e : program[AT_E] + e;
    }
    this.chords(arc, axes, from, to, fed);
  }

  private chords(arc: Arc, axes: number[], from: number[], to: number[], fed: number): void {
    const { row } = this;
    const rise = to[2] - from[2];
    const count = Math.min(Math.max(1, Math.floor(arcLengthMm(arc, rise) / this.motion.arcSegmentMm)), MAX_CHORDS);
    const startX = from[0] - arc.centreX;
    const startY = from[1] - arc.centreY;
    for (let i = 1; i <= count; i++) {
      const share = i / count;
      const angle = arc.sweepRad * share;
      const cos = Math.cos(angle);
      const sin = Math.sin(angle);
      const last = i === count;
      row.copyWithin(X0, X1, X1 + 3);
      row[X1 + axes[0]] = last ? to[0] : arc.centreX + startX * cos - startY * sin;
      row[X1 + axes[1]] = last ? to[1] : arc.centreY + startX * sin + startY * cos;
      row[X1 + axes[2]] = last ? to[2] : from[2] + rise * share;
      row[FED] = fed / count;
      this.sink.move();
    }
  }
}

/** Whether a displacement is one: relative moves that cancel out leave rounding errors, mm. */
const isTravel = (dx: number, dy: number, dz: number): boolean => dx * dx + dy * dy + dz * dz > 1e-18;
