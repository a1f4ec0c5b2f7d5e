import type { Channel } from "#shared/formats/machine.ts";
import type { Check } from "#shared/formats/proof.ts";
import type { DutyLimits } from "#shared/plan/limits.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { Evidence } from "#shared/prove/evidence.ts";
import { dutyWords } from "#shared/prove/wording.ts";

/** Decimal limits are not exact in binary. */
const TOLERANCE = 1e-9;

/** Every duty on a driven channel, kept raises included, lies within the limits; a fan is off or above its dead band. */
export function checkLimits(evidence: Evidence): Check {
  const said: string[] = [];
  for (const { channel, index } of evidence.channels()) {
    const limits = evidence.limits(channel);
    let highest = 0;
    for (const { entry, source, duty } of evidence.events[index]) {
      if (source === "file") continue;
      // A raise of the file may stall the fan where the file had it so; above the limit it may not be.
      const reason = reasonAgainst(duty, channel, source === "kept" ? { ...limits, minDuty: 0 } : limits);
      if (reason !== undefined)
        return verdict(
          "limits",
          `${channel.id} is set to ${dutyWords(duty)} at ${evidence.place(entry)}, ${reason}.`,
          "",
        );
      highest = Math.max(highest, duty);
    }
    const least = limits.minDuty > 0 ? `off or at least ${dutyWords(limits.minDuty)}, ` : "";
    said.push(`${channel.id} up to ${dutyWords(highest)} (allowed: ${least}at most ${dutyWords(limits.maxDuty)})`);
  }
  return verdict("limits", undefined, `${said.join("; ") || "No channel is driven"}.`);
}

function reasonAgainst(
  duty: number,
  channel: Channel,
  { minDuty, maxDuty, maxDutyPerS }: DutyLimits,
): string | undefined {
  if (!(duty <= maxDuty + TOLERANCE)) return `above its limit of ${dutyWords(maxDuty)}`;
  if (duty === 0 || duty >= minDuty - TOLERANCE) return undefined;
  if (channel.kind === "fan") return `where it stalls: off or at least ${dutyWords(minDuty)} is allowed`;
  // Less heat is the safe side: on the way to idle, or on a staircase that starts there.
  if (duty <= channel.idleDuty + TOLERANCE || Number.isFinite(maxDutyPerS)) return undefined;
  return `below its least duty of ${dutyWords(minDuty)}`;
}
