import type { ReadyChannel } from "#shared/plan/ready-channel.ts";
import type { Reasons } from "#shared/plan/reasons.ts";

/**
 * Keeps a duty within the largest change from the layer before.
 *
 * Between off and the least duty there is nothing to stop at, so that one jump is exempt: a rising channel may go from
 * off to its least duty at once, a falling one first comes down to its least duty and then goes off.
 *
 * @param wanted 0, or within the channel's limits
 * @param before duty of the layer before in print order, on a step of the drive
 * @returns 0, or within the channel's limits
 */
export function limitChange(wanted: number, before: number, channel: ReadyChannel, reasons: Reasons): number {
  const { maxDutyPerLayer, mayBeOff } = channel.limits;
  const change = wanted - before;
  if (Math.abs(change) <= maxDutyPerLayer + TOLERANCE) return wanted;
  const reached = before + Math.sign(change) * maxDutyPerLayer;
  if (reached >= channel.leastDuty || !mayBeOff) {
    reasons.add(`change limited to ${channel.text.perLayer} a layer`);
    return reached;
  }
  return crossDeadBand(wanted, before, channel, reasons);
}

/** A sum of duties may miss a limit by the last digits. */
const TOLERANCE = 1e-9;

/** The change limit would leave the channel between off and its least duty. */
function crossDeadBand(wanted: number, before: number, channel: ReadyChannel, reasons: Reasons): number {
  const { leastDuty, text } = channel;
  const exempt = wanted === 0 ? before <= leastDuty : wanted <= leastDuty;
  if (exempt) return wanted;
  const held = wanted > before ? `past the dead band to ${text.min}` : `held at ${text.min} before off`;
  reasons.add(`change limited to ${text.perLayer} a layer, ${held}`);
  return leastDuty;
}
