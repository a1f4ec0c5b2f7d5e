import { distanceMm, type Point } from "#samples/generate/contour.ts";
import type { Dialect, Feature, LayerPlace } from "#samples/generate/dialect.ts";

const FILAMENT_AREA_MM2 = Math.PI * (1.75 / 2) ** 2;
const TRAVEL_MM_S = 120;
const LIFT_MM_S = 10;
/** Travels longer than this are made retracted, mm. */
const RETRACT_BEYOND_MM = 2;

/** Beads, arcs and travels in; lines of one dialect out. Filament follows from the path as written times the bead's section. */
export class GcodeWriter {
  private readonly lines: string[] = [];
  private numberedLines = 0;
  private here: Point = { x: 0, y: 0 };
  private zMm = 0;
  private nextZMm: number | null = null;
  private speedMmS = 0;
  /** filament pushed since E was last set to 0: as computed, and as the written words add up */
  private filamentMm = 0;
  private writtenMm = 0;
  private retracted = false;
  private primed = false;
  private feature: Feature | null = null;
  private readonly dialect: Dialect;

  constructor(dialect: Dialect) {
    this.dialect = dialect;
  }

  get place(): Point {
    return this.here;
  }

  text(): string {
    return this.lines.map((line) => line + this.dialect.newline).join("");
  }

  comment(text: string): void {
    this.lines.push(text);
  }

  command(text: string): void {
    const cased = this.dialect.lowerCase ? text.toLowerCase() : text;
    this.lines.push(this.dialect.numbered ? withChecksum(`N${++this.numberedLines} ${cased}`) : cased);
  }

  fan(duty: number): void {
    this.command(this.dialect.fan(duty));
  }

  /** Writes the layer's marker and nothing else: all there is of a turn in a spiral. */
  mark(layer: LayerPlace): void {
    for (const line of this.dialect.marker(layer)) this.comment(line);
  }

  /** Writes the layer's marker; its height is taken up by the next travel. */
  beginLayer(layer: LayerPlace): void {
    this.mark(layer);
    if (this.dialect.extrusion === "absolute") this.restartE();
    this.nextZMm = layer.topMm;
    this.feature = null;
  }

  beginFeature(feature: Feature): void {
    if (feature === this.feature) return;
    this.feature = feature;
    const comment = this.dialect.feature(feature);
    if (comment !== null) this.comment(comment);
  }

  /** Travels, retracted if far, lifted if the dialect lifts; climbs before and sinks after moving sideways. */
  travelTo(target: Point): void {
    const to = rounded(target);
    const distance = distanceMm(this.here, to);
    const zMm = this.nextZMm ?? this.zMm;
    const far = this.nextZMm !== null || distance > RETRACT_BEYOND_MM;
    this.nextZMm = null;
    if (far) this.retract();
    const passMm = zMm + (far ? this.dialect.zHopMm : 0);
    if (this.dialect.zRides) {
      this.sideways(to, passMm);
    } else {
      if (passMm > this.zMm) this.toHeight(passMm);
      this.sideways(to, this.zMm);
    }
    this.toHeight(zMm);
    this.recover();
  }

  /** A straight bead; `zMm` lets it rise, as in a spiral. */
  beadTo(target: Point, sectionMm2: number, speedMmS: number, zMm = this.zMm): void {
    const to = rounded(target);
    const lengthMm = Math.hypot(distanceMm(this.here, to), zMm - this.zMm);
    const filament = this.eWord((lengthMm * sectionMm2) / FILAMENT_AREA_MM2);
    this.move("G1", speedMmS, ` X${shown(to.x)} Y${shown(to.y)}${this.zWord(zMm)}${filament}`);
    this.here = to;
    this.zMm = zMm;
    this.primed = true;
  }

  /** A bead along a circular arc. @param sweep angle in radians, counter-clockwise positive */
  arcTo(target: Point, centre: Point, sweep: number, sectionMm2: number, speedMmS: number): void {
    const to = rounded(target);
    const offset = rounded({ x: centre.x - this.here.x, y: centre.y - this.here.y });
    const lengthMm = Math.hypot(offset.x, offset.y) * Math.abs(sweep);
    const words = ` X${shown(to.x)} Y${shown(to.y)} I${shown(offset.x)} J${shown(offset.y)}`;
    const filament = this.eWord((lengthMm * sectionMm2) / FILAMENT_AREA_MM2);
    this.move(sweep > 0 ? "G3" : "G2", speedMmS, `${words}${filament}`);
    this.here = to;
    this.primed = true;
  }

  retract(): void {
    if (this.retracted || !this.primed) return;
    this.retracted = true;
    this.pullBack(-1, "G10");
  }

  /** Moves straight up or down. */
  toHeight(zMm: number): void {
    if (shown(zMm) === shown(this.zMm)) return;
    this.move(this.dialect.travelWord, LIFT_MM_S, ` Z${shown(zMm)}`);
    this.zMm = zMm;
  }

  private recover(): void {
    if (!this.retracted) return;
    this.retracted = false;
    this.pullBack(1, "G11");
  }

  private pullBack(sign: 1 | -1, firmware: string): void {
    const { retraction } = this.dialect;
    if (retraction.by === "firmware") this.command(firmware);
    else this.move("G1", retraction.speedMmS, this.eWord(sign * retraction.lengthMm));
  }

  private restartE(): void {
    this.command("G92 E0");
    this.filamentMm = 0;
    this.writtenMm = 0;
  }

  private sideways(to: Point, zMm: number): void {
    const rise = this.zWord(zMm);
    if (distanceMm(this.here, to) === 0 && rise === "") return;
    this.move(this.dialect.travelWord, TRAVEL_MM_S, ` X${shown(to.x)} Y${shown(to.y)}${rise}`);
    this.here = to;
    this.zMm = zMm;
  }

  private zWord(zMm: number): string {
    return shown(zMm) === shown(this.zMm) ? "" : ` Z${shown(zMm)}`;
  }

  /** One motion line; the feed rate is written only when it changes. */
  private move(word: string, speedMmS: number, words: string): void {
    const feed = speedMmS === this.speedMmS ? "" : ` F${shown(speedMmS * 60)}`;
    this.speedMmS = speedMmS;
    this.command(word + (this.dialect.feedFirst ? feed + words : words + feed));
  }

  private eWord(addedMm: number): string {
    this.filamentMm += addedMm;
    const before = this.writtenMm;
    this.writtenMm = Number(this.filamentMm.toFixed(5));
    const word = this.dialect.extrusion === "absolute" ? this.writtenMm : this.writtenMm - before;
    return ` E${Number(word.toFixed(5))}`;
  }
}

/** Exclusive or of all bytes before the asterisk. */
function withChecksum(line: string): string {
  let sum = 0;
  for (let index = 0; index < line.length; index++) sum ^= line.charCodeAt(index);
  return `${line}*${sum}`;
}

function rounded({ x, y }: Point): Point {
  return { x: Number(x.toFixed(3)), y: Number(y.toFixed(3)) };
}

function shown(value: number): string {
  return String(Number(value.toFixed(3)));
}
