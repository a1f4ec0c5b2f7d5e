import { type HeightView, yOf } from "#src/features/layer-log/height-view.ts";
import type { LayerStack } from "#src/features/layer-log/layer-stack.ts";
import { shownPositions } from "#src/features/layer-log/trace.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { decimalsOf, multiples, niceStep } from "#src/lib/scale.ts";

export interface AxisMark {
  y: number;
  text: string;
}

/** Least distance between two marks with numbers, px. */
const APART_PX = 34;

/** Heights above the bed, per object, in mm. */
export function heightMarks(stack: LayerStack, view: HeightView): AxisMark[] {
  const step = niceStep(view.toMm - view.fromMm, (view.bottomPx - view.topPx) / APART_PX);
  const decimals = decimalsOf(step);
  return stack.objects.flatMap(({ baseMm, topMm }, i) => {
    const from = Math.max(view.fromMm, baseMm) - baseMm;
    const to = Math.min(view.toMm, topMm) - baseMm;
    // The base of an object on top of another one is the border itself, and would be printed over the top's number.
    return multiples(from, to, step)
      .filter((mm) => i === 0 || mm > 0)
      .map((mm) => ({ y: yOf(view, baseMm + mm), text: fixedText(mm, decimals) }));
  });
}

/** Layer numbers, each at the middle of its layer. */
export function layerMarks(stack: LayerStack, view: HeightView): AxisMark[] {
  const [first, last] = shownPositions(stack, view);
  if (last < first) return [];
  const step = Math.max(1, niceStep(last - first + 1, (view.bottomPx - view.topPx) / APART_PX));
  const marks: AxisMark[] = [];
  let before = Number.POSITIVE_INFINITY;
  for (let i = first; i <= last; i++) {
    const index = stack.index[i];
    if (index % step !== 0 && !(index === 1 && step <= 2)) continue;
    const y = yOf(view, (stack.bottomMm[i] + stack.topMm[i]) / 2);
    // Layers of uneven height may bring two numbers together.
    if (before - y < APART_PX / 2 || y < view.topPx || y > view.bottomPx) continue;
    marks.push({ y, text: String(index) });
    before = y;
  }
  return marks;
}
