import type { Machine } from "#shared/formats/machine.ts";
import { LineKind, LineScan, scanLine } from "#shared/gcode/scan-line.ts";
import { Interpreter, type LimitChange, type MotionSink } from "#shared/machine/interpreter.ts";
import { FED, newMove, SPEED, X0, X1, Y0, Y1, Z0, Z1 } from "#shared/machine/move.ts";
import { latin } from "#tests/helpers/reading.ts";
import { tern } from "#tests/helpers/tern.ts";

export interface Move {
  from: [number, number, number];
  to: [number, number, number];
  fed: number;
  speed: number;
}

/** Writes down what the interpreter says. */
export class Recorder implements MotionSink {
  readonly row = newMove();
  readonly moves: Move[] = [];
  readonly waits: [kind: string, seconds: number | null][] = [];
  readonly nozzleC: number[] = [];
  readonly bedC: number[] = [];
  readonly changes: LimitChange[] = [];
  readonly oddities: string[] = [];

  move(): void {
    const { row } = this;
    this.moves.push({
      from: [row[X0], row[Y0], row[Z0]],
      to: [row[X1], row[Y1], row[Z1]],
      fed: row[FED],
      speed: row[SPEED],
    });
  }
  wait(kind: string, seconds: number | null): void {
    this.waits.push([kind, seconds]);
  }
  nozzle(celsius: number): void {
    this.nozzleC.push(celsius);
  }
  bed(celsius: number): void {
    this.bedC.push(celsius);
  }
  limits(change: LimitChange): void {
    this.changes.push(change);
  }
  odd(code: string): void {
    this.oddities.push(code);
  }

  /** where the machine stands */
  get position(): number[] {
    return [this.row[X1], this.row[Y1], this.row[Z1]];
  }
  get last(): Move {
    return this.moves[this.moves.length - 1];
  }
  get fed(): number[] {
    return this.moves.map(({ fed }) => fed);
  }
}

const TERN = tern();

/** Runs lines of words through the interpreter. */
export function run(lines: readonly string[], machine: Machine = TERN): Recorder {
  const recorder = new Recorder();
  const interpreter = new Interpreter(machine, recorder);
  const scan = new LineScan();
  for (const line of lines) {
    scanLine(latin(`${line}\n\0`), 0, scan);
    if (scan.kind === LineKind.words) interpreter.run(scan);
  }
  return recorder;
}
