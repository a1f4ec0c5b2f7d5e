/**
 * Generated toolpaths for the bench: walls as polygons of short moves, zigzag infill, travels with retraction, a fan
 * line and a marker a layer; about 30 bytes a line. Deterministic, made in pieces, any size.
 */
export type Dialect = "plain" | "lower-case" | "numbered" | "parenthesised" | "relative";
export const DIALECTS: readonly Dialect[] = ["plain", "lower-case", "numbered", "parenthesised", "relative"];

const SIDES = 120;
const INFILL_LINES = 90;
/** Islands a layer, of half a megabyte together: 1 GB is then some 380 mm high, as high as printers go. */
const ISLANDS = 40;
const IN_A_ROW = 8;

const encoder = new TextEncoder();

/**
 * Yields whole layers as bytes until `bytes` are reached.
 *
 * @param bytes wanted size, reached within one layer
 */
export function* generateToolpath(bytes: number, dialect: Dialect = "plain"): Generator<Uint8Array> {
  const format = new Formatter(dialect);
  let made = 0;
  const out = (text: string): Uint8Array => {
    const piece = encoder.encode(text);
    made += piece.length;
    return piece;
  };
  yield out(
    format.lines([
      "M140 S120",
      "M104 S390",
      "G28",
      "M190 S120",
      "M109 S390",
      ...(dialect === "relative" ? ["G91", "M83"] : ["G90", "M83"]),
      "M107",
    ]),
  );
  for (let layer = 1; made < bytes; layer++) yield out(layerText(layer, format, dialect));
  yield out(format.lines(["M107", "M104 S0", "M140 S0"]));
}

function layerText(layer: number, format: Formatter, dialect: Dialect): string {
  const z = layer * 0.2;
  const lines: string[] = [`;LAYER:${layer - 1}`, `M106 S${(layer * 7) % 256}`];
  const path = new Path(lines, dialect === "relative", z);
  for (let island = 0; island < ISLANDS; island++) {
    const cx = 40 + (island % IN_A_ROW) * 50;
    const cy = 40 + Math.floor(island / IN_A_ROW) * 50;
    for (let wall = 0; wall < 3; wall++) path.ring(cx, cy, 18 - wall * 0.45 + Math.sin(layer / 40));
    path.zigzag(cx, cy, 15, layer);
  }
  return format.lines(lines);
}

/** Writes moves, absolute or relative; E is always relative. */
class Path {
  private x = 0;
  private y = 0;
  private readonly lines: string[];
  private readonly relative: boolean;
  private zWord: string;

  constructor(lines: string[], relative: boolean, z: number) {
    this.lines = lines;
    this.relative = relative;
    this.zWord = relative ? " Z0.2" : ` Z${z.toFixed(1)}`;
  }

  ring(cx: number, cy: number, radius: number): void {
    this.travel(cx + radius, cy);
    for (let k = 1; k <= SIDES; k++) {
      const angle = (2 * Math.PI * k) / SIDES;
      this.lay(cx + radius * Math.cos(angle), cy + radius * Math.sin(angle), k === 1 ? " F1800" : "");
    }
  }

  zigzag(cx: number, cy: number, half: number, layer: number): void {
    this.travel(cx - half, cy - half);
    for (let k = 0; k < INFILL_LINES; k++) {
      const across = -half + (2 * half * (k + 1)) / INFILL_LINES;
      const along = k % 2 === 0 ? half : -half;
      if (layer % 2 === 0) this.lay(cx + along, cy + across, k === 0 ? " F3000" : "");
      else this.lay(cx + across, cy + along, k === 0 ? " F3000" : "");
    }
  }

  private travel(x: number, y: number): void {
    this.lines.push("G1 E-0.8 F2100", `G0 ${this.words(x, y)}${this.zWord} F9000`, "G1 E0.8 F2100");
    this.zWord = "";
  }

  private lay(x: number, y: number, feed: string): void {
    const length = Math.hypot(x - this.x, y - this.y);
    this.lines.push(`G1 ${this.words(x, y)} E${(length * 0.0374).toFixed(5)}${feed}`);
  }

  private words(x: number, y: number): string {
    const [dx, dy] = [x - this.x, y - this.y];
    this.x = x;
    this.y = y;
    return this.relative ? `X${dx.toFixed(3)} Y${dy.toFixed(3)}` : `X${x.toFixed(3)} Y${y.toFixed(3)}`;
  }
}

class Formatter {
  private number = 0;
  private readonly dialect: Dialect;

  constructor(dialect: Dialect) {
    this.dialect = dialect;
  }

  lines(lines: readonly string[]): string {
    let text = "";
    for (const line of lines) text += `${this.line(line)}\n`;
    return text;
  }

  private line(line: string): string {
    if (line.startsWith(";")) return line;
    switch (this.dialect) {
      case "lower-case":
        return line.toLowerCase();
      case "parenthesised":
        return `${line} (part 1)`;
      case "numbered": {
        const text = `N${++this.number} ${line}`;
        let sum = 0;
        for (let k = 0; k < text.length; k++) sum ^= text.charCodeAt(k);
        return `${text}*${sum}`;
      }
      default:
        return line;
    }
  }
}
