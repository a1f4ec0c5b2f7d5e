import { LinesOfOffsets, OffsetsOfLines } from "#server/toolpaths/line-starts.ts";
import type { Edit } from "#shared/rewrite/edits.ts";

/** A place in both files: the original's byte and line, and the tuned file's. */
export interface Place {
  offset: number;
  line: number;
  tunedOffset: number;
  tunedLine: number;
}

/** One edit: where it begins in both files, how many lines it took out and put in. */
export interface PlacedEdit extends Place {
  removedLines: number;
  insertedLines: number;
}

/** Where a layer's part begins, and its first edit's position in the list of edits. */
export interface PlacedLayer extends Place {
  firstEdit: number;
}

/** Columns of the stored tables. */
export const EDIT_WIDTH = 6;
export const LAYER_WIDTH = 5;

export const editRow = (edit: PlacedEdit): number[] => [
  edit.offset,
  edit.line,
  edit.tunedOffset,
  edit.tunedLine,
  edit.removedLines,
  edit.insertedLines,
];
export const layerRow = (layer: PlacedLayer): number[] => [
  layer.offset,
  layer.line,
  layer.tunedOffset,
  layer.tunedLine,
  layer.firstEdit,
];

export function editOfRow([offset, line, tunedOffset, tunedLine, removedLines, insertedLines]: number[]): PlacedEdit {
  return { offset, line, tunedOffset, tunedLine, removedLines, insertedLines };
}

export function layerOfRow([offset, line, tunedOffset, tunedLine, firstEdit]: number[]): PlacedLayer {
  return { offset, line, tunedOffset, tunedLine, firstEdit };
}

/**
 * Finds every edit and every layer's beginning in both files while they stream by. Line numbers follow from the edits;
 * bytes of the tuned file do not, since a numbered file's lines change their length, so they are found by their lines.
 *
 *     const finder = new PlaceFinder(edits, layers);
 *     … finder.original(chunk) for the whole file; then finder.turn(); … finder.tuned(chunk) …; finder.end()
 */
export class PlaceFinder {
  private readonly edits: readonly Edit[];
  private readonly layers: readonly (readonly [offset: number, line: number])[];
  private readonly inOriginal: LinesOfOffsets;
  private placed: PlacedEdit[] = [];
  private begun: PlacedLayer[] = [];
  private inTuned = new OffsetsOfLines([]);

  /** @param layers byte and line of each, the file's end last; both lists ascend */
  constructor(edits: readonly Edit[], layers: readonly (readonly [offset: number, line: number])[]) {
    this.edits = edits;
    this.layers = layers;
    this.inOriginal = new LinesOfOffsets(edits.flatMap(({ offset, remove }) => [offset, offset + remove]));
  }

  original(chunk: Uint8Array): void {
    this.inOriginal.push(chunk);
  }

  /** Between the files: from here on lines of the tuned file are known. */
  turn(): void {
    const lines = this.inOriginal.end();
    let grown = 0;
    this.placed = this.edits.map(({ offset, insert }, k) => {
      const line = lines[2 * k];
      const removedLines = lines[2 * k + 1] - line;
      const insertedLines = terminators(insert);
      const edit = { offset, line, tunedOffset: 0, tunedLine: line + grown, removedLines, insertedLines };
      grown += insertedLines - removedLines;
      return edit;
    });
    this.begun = this.layers.map(([offset, line]) => this.beginning(offset, line));
    this.inTuned = new OffsetsOfLines(this.all().map(({ tunedLine }) => tunedLine));
  }

  tuned(chunk: Uint8Array): void {
    this.inTuned.push(chunk);
  }

  end(): { edits: PlacedEdit[]; layers: PlacedLayer[] } {
    const offsets = this.inTuned.end();
    for (const [k, place] of this.all().entries()) place.tunedOffset = offsets[k];
    return { edits: this.placed, layers: this.begun };
  }

  private all(): Place[] {
    return [...this.placed, ...this.begun].sort((a, b) => a.tunedLine - b.tunedLine);
  }

  /** What is inserted at a layer's beginning belongs to it; so the first edit is the first at or behind that byte. */
  private beginning(offset: number, line: number): PlacedLayer {
    const atEnd = offset === this.layers[this.layers.length - 1][0];
    const firstEdit = atEnd ? this.placed.length : firstAtOrBehind(this.placed, offset);
    const before = this.placed[firstEdit - 1];
    const grown = before ? before.tunedLine + before.insertedLines - before.line - before.removedLines : 0;
    return { offset, line, tunedOffset: 0, tunedLine: line + grown, firstEdit };
  }
}

function firstAtOrBehind(edits: readonly Place[], offset: number): number {
  let low = 0;
  let high = edits.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (edits[middle].offset < offset) low = middle + 1;
    else high = middle;
  }
  return low;
}

const terminators = (text: string): number => text.match(/\r\n|\r|\n/g)?.length ?? 0;
