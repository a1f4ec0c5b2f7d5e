declare module "gcode-parser" {
  import { Transform } from "node:stream";
  export class GCodeLineStream extends Transform {
    constructor(options?: { batchSize?: number; flatten?: boolean; lineMode?: string });
  }
  export function parseLine(
    line: string,
    options?: { flatten?: boolean; lineMode?: "original" | "stripped" | "compact" },
  ): { line: string; words: [string, number | string][]; ln?: number; cs?: number; err?: boolean; cmds?: string[] };
}
