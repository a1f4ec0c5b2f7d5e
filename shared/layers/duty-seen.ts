import type { Machine } from "#shared/formats/machine.ts";
import type { ControlLine, DutySeen, Layer } from "#shared/layers/reading.ts";

/** The duties that the file commanded while each layer lasted, channel by channel; before the first command a channel is off. */
export function fillDutySeen(layers: Layer[], controls: readonly ControlLine[], machine: Machine): void {
  for (const [index, channel] of machine.channels.entries()) {
    const changes = controls.filter((line) => line.channel === index && !Number.isNaN(line.duty));
    let next = 0;
    let duty = 0;
    for (const layer of layers) {
      const endS = layer.startsAtS + layer.timeS;
      while (next < changes.length && changes[next].timeS <= layer.startsAtS && changes[next].offset < layer.firstByte)
        duty = changes[next++].duty;
      const seen: DutySeen = { mean: 0, min: duty, max: duty, commands: 0 };
      let sinceS = layer.startsAtS;
      let area = 0;
      while (next < changes.length && changes[next].offset < layer.endByte) {
        const change = changes[next++];
        const atS = Math.min(Math.max(change.timeS, sinceS), endS);
        area += duty * (atS - sinceS);
        sinceS = atS;
        duty = change.duty;
        seen.commands++;
        seen.min = Math.min(seen.min, duty);
        seen.max = Math.max(seen.max, duty);
      }
      area += duty * (endS - sinceS);
      // The sum may miss the mean by the last digit, and a duty of 1.0000000000000002 is none.
      seen.mean = layer.timeS > 0 ? Math.min(Math.max(area / layer.timeS, seen.min), seen.max) : duty;
      layer.duty[channel.id] = seen;
    }
  }
}
