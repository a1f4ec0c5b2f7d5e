import { type LayerStack, objectAt } from "#src/features/layer-log/layer-stack.ts";
import { fixedText } from "#src/lib/number-text.ts";

/** Number and height of a layer as the head of the log shows them; position -1: of none. */
export function layerText(stack: LayerStack, position: number) {
  if (position < 0) return { number: "", height: "–", of: `${stack.count} layers` };
  const height = fixedText(stack.topMm[position] - objectAt(stack, position).baseMm, 2);
  return { number: String(stack.index[position]), height, of: `of ${stack.count}` };
}

/** A layer's place as it is read out. */
export function spokenLayer(stack: LayerStack, position: number): string {
  const { baseMm, object } = objectAt(stack, position);
  const where = stack.objects.length > 1 ? ` of object ${object}` : "";
  return `Layer ${stack.index[position]} of ${stack.count}, ${fixedText(stack.topMm[position] - baseMm, 2)} mm${where}`;
}
