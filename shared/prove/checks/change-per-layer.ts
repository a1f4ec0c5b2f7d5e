import type { Check } from "#shared/formats/proof.ts";
import type { Plan } from "#shared/plan/plan.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { Evidence } from "#shared/prove/evidence.ts";
import { dutyWords } from "#shared/prove/wording.ts";
import { dutySteps } from "#shared/units/duty.ts";

const TOLERANCE = 1e-9;

/**
 * From each layer to the next in print order a duty changes by no more than the profile allows, but for the jump over
 * the gap between off and the least duty. It looks at the plan; that the file carries the plan out is a check of its own.
 */
export function checkChangePerLayer(evidence: Evidence, plan: Plan | string): Check {
  if (typeof plan === "string") return verdict("change-per-layer", plan, "");
  const said: string[] = [];
  for (const { channel } of evidence.channels()) {
    const { maxDutyPerLayer, minDuty } = evidence.limits(channel);
    if (!Number.isFinite(maxDutyPerLayer)) continue;
    let largest = 0;
    let gaps = 0;
    for (let k = 1; k < plan.layers.length; k++) {
      const [before, duty] = [plan.layers[k - 1].duty[channel.id], plan.layers[k].duty[channel.id]];
      const change = Math.abs(duty - before);
      const overGap = Math.min(duty, before) === 0 && Math.max(duty, before) < minDuty + 1 / dutySteps(channel.drive);
      if (change > maxDutyPerLayer + TOLERANCE && !overGap)
        return verdict(
          "change-per-layer",
          `${channel.id} changes from ${dutyWords(before)} to ${dutyWords(duty)} at layer ${plan.layers[k].index}; ${maxDutyPerLayer} a layer is allowed.`,
          "",
        );
      if (!overGap) largest = Math.max(largest, change);
      else if (change > 0) gaps++;
    }
    const apart = gaps > 0 ? `, ${gaps === 1 ? "a step" : `${gaps} steps`} between off and the least duty apart` : "";
    said.push(`${channel.id} changes by up to ${dutyWords(largest)} (allowed: ${maxDutyPerLayer})${apart}`);
  }
  return verdict(
    "change-per-layer",
    undefined,
    `From layer to layer: ${said.join("; ") || "no largest change is set"}.`,
  );
}
