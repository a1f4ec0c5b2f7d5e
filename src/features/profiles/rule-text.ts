import type { Lead, Limits, Pattern, Rule, Zone } from "#shared/formats/profile.ts";

const OVER = {
  "layer-time": "s of layer time",
  "deposited-length": "mm of deposited length",
  height: "mm of height",
} as const;

/** A rule as one would say it. */
export function ruleText(rule: Rule): string {
  switch (rule.rule) {
    case "fixed":
      return `${rule.duty.toFixed(2)} throughout`;
    case "curve":
      return `${rule.points.map(([x, duty]) => `${duty.toFixed(2)} at ${x}`).join(", ")} ${OVER[rule.over]}`;
    case "hold":
      return rule.baseDuty === undefined
        ? "solved from the target"
        : `solved from the target, above ${rule.baseDuty.toFixed(2)}`;
  }
}

/** The states within a zone, from the bottom up. */
export function patternText(pattern: Pattern): string {
  if (pattern.kind === "graded") return `graded from ${pattern.from} to ${pattern.to}`;
  const { amorphousLayers, semiCrystallineLayers, first } = pattern;
  const parts = [`${amorphousLayers} amorphous`, `${semiCrystallineLayers} semi-crystalline`];
  return `by turns ${(first === "amorphous" ? parts : parts.reverse()).join(", ")}`;
}

/** The band a zone covers, lower border first. */
export function bandText({ from, to, unit }: Zone): string {
  const upper = to === undefined ? "to the top" : unit === "layer" ? `to ${to}` : `to ${to}`;
  if (unit === "layer") return `layer ${Math.max(1, from)} ${upper}`;
  if (unit === "fraction") return `${from} ${upper} of the height`;
  return `${from} mm ${upper}${to === undefined ? "" : " mm"}`;
}

export function limitText({ minDuty, maxDuty, maxDutyPerLayer, maxDutyPerS, endRampMm }: Limits): string {
  const parts = [
    minDuty !== undefined && `at least ${minDuty}`,
    maxDuty !== undefined && `at most ${maxDuty}`,
    maxDutyPerLayer !== undefined && `${maxDutyPerLayer} a layer`,
    maxDutyPerS !== undefined && `${maxDutyPerS} a second`,
    endRampMm !== undefined && `stepped down over the last ${endRampMm} mm`,
  ];
  return parts.filter(Boolean).join(", ");
}

export const leadText = (lead: Lead | undefined): string =>
  lead === undefined ? "0 s" : lead === "settle" ? "half the settle time" : `${lead} s`;
