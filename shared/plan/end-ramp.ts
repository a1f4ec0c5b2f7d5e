import type { PlacedLayer } from "#shared/plan/layer-placer.ts";
import type { ReadyChannel } from "#shared/plan/ready-channel.ts";
import type { Reasons } from "#shared/plan/reasons.ts";

/**
 * Steps a heater down to its idle duty, linearly over the last millimetres of the print: the layer at the very top runs
 * at idle. Of objects printed one after the other only the last is stepped down, since the one before it is followed by
 * bed layers that need the lamp. A duty at or below idle is left alone.
 *
 * @param duty the layer's duty so far, 0-1
 */
export function applyEndRamp(duty: number, channel: ReadyChannel, placed: PlacedLayer, reasons: Reasons): number {
  const { idleDuty, limits } = channel;
  if (!inEndRamp(channel, placed) || duty <= idleDuty) return duty;
  const share = placed.belowEndUm / channel.endRampUm;
  reasons.add(`end ramp over the last ${limits.endRampMm} mm: ${Math.round(share * 100)} % left`);
  return idleDuty + (duty - idleDuty) * share;
}

export function inEndRamp({ endRampUm }: ReadyChannel, { belowEndUm }: PlacedLayer): boolean {
  return belowEndUm < endRampUm;
}
