import { Machine } from "#shared/formats/machine.ts";
import { ToolpathReader } from "#shared/layers/read-toolpath.ts";

const LAYERS = 40;
const SIDES = 400;

/** Reads a made-up part, so that the engine's hot loops are compiled before the first real file comes. */
export function warmUp(): void {
  const reader = new ToolpathReader(machine());
  for (let layer = 1; layer <= LAYERS; layer++) reader.push(Buffer.from(ring(layer)));
  reader.end("");
}

function ring(layer: number): string {
  const lines = [`G0 X90 Y50 Z${(layer * 0.2).toFixed(1)} F9000`];
  for (let k = 1; k <= SIDES; k++) {
    const angle = (2 * Math.PI * k) / SIDES;
    const [x, y] = [50 + 40 * Math.cos(angle), 50 + 40 * Math.sin(angle)];
    lines.push(`G1 X${x.toFixed(3)} Y${y.toFixed(3)} E${(layer * SIDES + k) * 0.02} F1800`);
  }
  return `${lines.join("\n")}\n`;
}

const machine = (): Machine =>
  Machine.parse({
    format: "quenchline.machine/1",
    name: "warm-up",
    motion: {
      maxSpeedMmS: 200,
      accelMmS2: { print: 1500, travel: 1500, retract: 1500 },
      cornering: { rule: "square-corner-velocity", speedMmS: 5, cruiseRatio: 0.5 },
    },
    channels: [{ id: "fan", kind: "fan", drive: { by: "fan-index", index: 0, fullScale: 255 } }],
  });
