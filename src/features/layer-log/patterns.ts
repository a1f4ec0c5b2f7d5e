import type { Palette } from "#src/features/layer-log/palette.ts";
import type { PredictedState, TargetState } from "#src/lib/state-fill.ts";

type Fill = CanvasPattern | string;

/**
 * Fills that tell states and ranges apart without colour, drawn as a lithology column is: a sparse stipple for
 * amorphous, lamellae for semi-crystalline, a slanting hatch of both where nothing is decided, one of grey where nothing is wanted.
 */
export interface Patterns {
  state: Record<TargetState | PredictedState, Fill>;
  /** a slanting hatch in any colour of the sheet, for ranges */
  hatch(colour: string): Fill;
}

const TILE_PX = 8;

export function makePatterns(context: CanvasRenderingContext2D, palette: Palette, ratio: number): Patterns {
  const pattern = (draw: (tile: CanvasRenderingContext2D) => void, fallback: string): Fill => {
    const canvas = document.createElement("canvas");
    canvas.width = Math.round(TILE_PX * ratio);
    canvas.height = Math.round(TILE_PX * ratio);
    const tile = canvas.getContext("2d");
    if (!tile) return fallback;
    tile.scale(canvas.width / TILE_PX, canvas.height / TILE_PX);
    draw(tile);
    const made = context.createPattern(canvas, "repeat");
    made?.setTransform(new DOMMatrix().scale(TILE_PX / canvas.width, TILE_PX / canvas.height));
    return made ?? fallback;
  };
  const hatches = new Map<string, Fill>();
  return {
    state: {
      amorphous: pattern((tile) => stipple(tile, palette), palette.amber),
      "semi-crystalline": pattern((tile) => lamellae(tile, palette), palette.bone),
      undecided: pattern((tile) => stripes(tile, palette), palette.well),
      none: pattern((tile) => slant(tile, palette.rule, 0.7), palette.well),
    },
    hatch(colour) {
      const made = hatches.get(colour) ?? pattern((tile) => slant(tile, colour, 0.55), colour);
      hatches.set(colour, made);
      return made;
    },
  };
}

function stipple(tile: CanvasRenderingContext2D, { amber, amberHatch }: Palette): void {
  tile.globalAlpha = 0.5;
  tile.fillStyle = amber;
  tile.fillRect(0, 0, TILE_PX, TILE_PX);
  tile.globalAlpha = 0.75;
  tile.fillStyle = amberHatch;
  for (const [x, y] of [
    [1, 1],
    [5, 5],
  ]) {
    tile.fillRect(x, y, 1, 1);
  }
}

function lamellae(tile: CanvasRenderingContext2D, { bone, boneHatch }: Palette): void {
  tile.fillStyle = bone;
  tile.fillRect(0, 0, TILE_PX, TILE_PX);
  tile.globalAlpha = 0.55;
  tile.fillStyle = boneHatch;
  for (const y of [1, 5]) tile.fillRect(0, y, TILE_PX, 1);
}

/** Slanting stripes of amber and bone by turns. */
function stripes(tile: CanvasRenderingContext2D, { amber, bone }: Palette): void {
  tile.fillStyle = bone;
  tile.fillRect(0, 0, TILE_PX, TILE_PX);
  tile.globalAlpha = 0.6;
  tile.strokeStyle = amber;
  tile.lineWidth = TILE_PX / 2 / Math.SQRT2;
  tile.beginPath();
  for (const shift of [-TILE_PX, 0, TILE_PX]) {
    tile.moveTo(shift - 2, TILE_PX + 2);
    tile.lineTo(shift + TILE_PX + 2, -2);
  }
  tile.stroke();
}

function slant(tile: CanvasRenderingContext2D, colour: string, alpha: number): void {
  tile.globalAlpha = alpha;
  tile.strokeStyle = colour;
  tile.lineWidth = 1;
  tile.beginPath();
  // The line once, and its neighbours in the corners, so that the tiles join.
  for (const shift of [-TILE_PX, 0, TILE_PX]) {
    tile.moveTo(shift, TILE_PX);
    tile.lineTo(shift + TILE_PX, 0);
  }
  tile.stroke();
}
