import type { Machine } from "#shared/formats/machine.ts";
import { LineScan, scanLine } from "#shared/gcode/scan-line.ts";
import { Interpreter } from "#shared/machine/interpreter.ts";
import { FED, newMove, SPEED, X1, Y1, Z1 } from "#shared/machine/move.ts";
import { Planner } from "#shared/motion/planner.ts";
import { FEEDS, LAYS, TRAVELS } from "#shared/motion/record.ts";
import { latin } from "#tests/helpers/reading.ts";
import { Recorder } from "#tests/helpers/recorder.ts";

/** A straight move as a displacement: mm, material fed, programmed speed. */
export interface Step {
  dx: number;
  dy: number;
  dz: number;
  de: number;
  speedMmS: number;
}

export interface Planned {
  /** duration of each move, s */
  timeS: number[];
  lengthMm: number[];
  totalS: number;
  /** times that some of the moves were settled */
  batches: number;
  forcedStops: number;
}

const kindOf = ({ dx, dy, dz, de }: Step): number =>
  dx === 0 && dy === 0 ? (dz === 0 ? FEEDS : TRAVELS) : de > 0 ? LAYS : TRAVELS;

/** Plans moves as the reader does, from rest to rest. */
export function plan(steps: Iterable<Step>, { motion }: Machine): Planned {
  const timeS: number[] = [];
  const lengthMm: number[] = [];
  let batches = 0;
  const planner = new Planner(motion, (count) => {
    batches++;
    for (let i = 0; i < count; i++) {
      timeS.push(planner.timeS[i]);
      lengthMm.push(planner.lengthMm[i]);
    }
  });
  const row = newMove();
  for (const step of steps) {
    row[X1] = step.dx;
    row[Y1] = step.dy;
    row[Z1] = step.dz;
    row[FED] = step.de;
    row[SPEED] = step.speedMmS;
    planner.add(row, kindOf(step));
  }
  planner.stop();
  return { timeS, lengthMm, totalS: sum(timeS), batches, forcedStops: planner.forcedStops };
}

/** Runs a program through interpreter and planner; its dwells are stops. */
export function planProgram(lines: readonly string[], machine: Machine): Planned {
  const times: number[] = [];
  const lengths: number[] = [];
  let batches = 0;
  const planner = new Planner(machine.motion, (count) => {
    batches++;
    times.push(...planner.timeS.subarray(0, count));
    lengths.push(...planner.lengthMm.subarray(0, count));
  });
  class Planning extends Recorder {
    override move(): void {
      planner.add(this.row, TRAVELS);
    }
    override wait(): void {
      planner.stop();
    }
  }
  const interpreter = new Interpreter(machine, new Planning());
  const scan = new LineScan();
  for (const line of lines) {
    scanLine(latin(`${line}\n\0`), 0, scan);
    interpreter.run(scan);
  }
  planner.stop();
  return { timeS: times, lengthMm: lengths, totalS: sum(times), batches, forcedStops: planner.forcedStops };
}

export const sum = (numbers: readonly number[]): number => numbers.reduce((total, number) => total + number, 0);

export const lengthOf = ({ dx, dy, dz, de }: Step): number => Math.hypot(dx, dy, dz) || Math.abs(de);

export const travel = (dx: number, dy: number, speedMmS: number): Step => ({ dx, dy, dz: 0, de: 0, speedMmS });
