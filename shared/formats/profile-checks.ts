import type { z } from "zod";
import type { CurvePoint, Limits, Margins, Zone } from "#shared/formats/profile.ts";

type Context = z.core.$RefinementCtx;

/** A curve has a point, and its points go strictly to the right. */
export function checkCurve(points: readonly CurvePoint[], context: Context): void {
  if (points.length === 0) {
    context.addIssue({ code: "custom", message: "has no point. Give at least one, as [x, duty]", input: points });
  }
  for (let i = 1; i < points.length; i++) {
    const [before, x] = [points[i - 1][0], points[i][0]];
    if (x > before) continue;
    const message = `must be greater than the x of the point before (${before}), got ${x}. Sort the points and give every x once`;
    context.addIssue({ code: "custom", path: [i, 0], message, input: points });
  }
}

/** What must hold within one zone. */
export function checkZone(zone: Zone, context: Context): void {
  checkBorders(zone, context);
  checkTarget(zone, context);
  const seen = new Map<string, string>();
  for (const side of ["cooling", "heating"] as const) {
    zone[side].forEach(({ channel }, i) => {
      const place = zone[side].length === 1 ? side : `${side}[${i}]`;
      const earlier = seen.get(channel);
      if (earlier !== undefined) {
        const message = `"${channel}" has a rule in this zone already, at ${earlier}. Give every channel one rule per zone`;
        context.addIssue({ code: "custom", path: [side, i, "channel"], message, input: zone });
      } else seen.set(channel, place);
    });
  }
}

/** What is held needs a state to be held on, and a pattern is one that only a rule that holds can follow. */
function checkTarget({ target, pattern, cooling, heating }: Zone, context: Context): void {
  const report = (path: PropertyKey[], message: string) =>
    context.addIssue({ code: "custom", path, message, input: target });
  const holds = [...cooling, ...heating].some(({ rule }) => rule === "hold");
  if (pattern === undefined) {
    if (holds && target === "none")
      report(
        ["target"],
        'is "none", but a rule of this zone is "hold". Say which state is to be held, or use "fixed" or "curve"',
      );
    return;
  }
  if (target !== "none")
    report(
      ["target"],
      `is "${target}", but the zone has a pattern, which says the states. Give "none", or take the pattern out`,
    );
  if (!holds) report(["pattern"], 'needs a rule that is solved from it. Use "hold" for heating, cooling or both');
  if (pattern.kind === "graded" && pattern.from === pattern.to)
    report(["pattern", "to"], `is "${pattern.to}" like from, so nothing changes. Give the other state, or use target`);
}

function checkBorders({ from, to, unit }: Zone, context: Context): void {
  const report = (field: string, message: string) =>
    context.addIssue({ code: "custom", path: [field], message, input: { from, to, unit } });
  for (const [field, border] of [
    ["from", from],
    ["to", to],
  ] as const) {
    if (border === undefined) continue;
    if (unit === "layer" && !Number.isInteger(border)) {
      report(field, `must be a whole layer number, got ${border}. Round it, or give the zone in mm`);
    }
    if (unit === "fraction" && border > 1) {
      report(field, `must be at most 1 with unit "fraction", got ${border}. Give 0-1, or use unit "mm" or "layer"`);
    }
  }
  if (to !== undefined && !(stepsOf(from, unit) < stepsOf(to, unit))) {
    report("to", `is ${to}, not above from ${from}. A zone covers (from, to]: give a to above its from`);
  }
}

/** What must hold between the zones: one unit, from the bottom up, without gap or overlap. */
export function checkZones(zones: readonly Zone[], context: Context): void {
  const report = (i: number, field: string, message: string) =>
    context.addIssue({ code: "custom", path: [i, field], message, input: zones });
  if (zones.length === 0) {
    context.addIssue({ code: "custom", message: "has no zone. Give at least one, from 0 up", input: zones });
    return;
  }
  const { unit } = zones[0];
  const stranger = zones.findIndex((zone) => zone.unit !== unit);
  if (stranger > 0) {
    // Borders in different units cannot be compared, so nothing more is said about them.
    const message = `is "${zones[stranger].unit}", but zones[0] uses "${unit}". Use one unit for all zones of a profile`;
    report(stranger, "unit", message);
    return;
  }
  checkFirst(zones[0], report);
  for (let i = 1; i < zones.length; i++) checkSeam(zones, i, report);
  checkLast(zones, report);
}

type Report = (index: number, field: string, message: string) => void;

function checkFirst({ name, from, unit }: Zone, report: Report): void {
  const allowed = unit === "layer" ? [0, 1] : [0];
  if (allowed.includes(from)) return;
  report(
    0,
    "from",
    `is ${from}, so nothing is said below zone "${name}". Start the first zone at ${allowed.join(" or ")}`,
  );
}

function checkSeam(zones: readonly Zone[], i: number, report: Report): void {
  const [below, zone] = [zones[i - 1], zones[i]];
  const names = `zones "${below.name}" and "${zone.name}"`;
  if (zone.from < below.from) {
    report(i, "from", `is ${zone.from}, below the zone before it (${names}). List the zones from the bottom up`);
    return;
  }
  if (below.to === undefined) {
    report(i - 1, "to", `is missing, but zone "${zone.name}" follows. Only the last zone may leave it out`);
    return;
  }
  const [end, start] = [stepsOf(below.to, zone.unit), stepsOf(zone.from, zone.unit)];
  if (start < end) {
    report(i, "from", `is ${zone.from}, so ${names} overlap up to ${below.to}. Start "${zone.name}" at ${below.to}`);
  }
  if (start > end) {
    const layers =
      zone.unit === "layer" ? `. A zone covers (from, to], so from ${below.to} begins with layer ${below.to + 1}` : "";
    report(
      i,
      "from",
      `is ${zone.from}, so between ${names} there is a gap from ${below.to} to ${zone.from}. Start "${zone.name}" at ${below.to}${layers}`,
    );
  }
}

function checkLast(zones: readonly Zone[], report: Report): void {
  const last = zones[zones.length - 1];
  if (last.unit !== "fraction" || last.to === undefined || last.to >= 1) return;
  report(zones.length - 1, "to", `is ${last.to}, so nothing is said above zone "${last.name}". Give 1 or leave it out`);
}

/** Borders are compared in whole steps: micrometres, layers or millionths, as the plan compares heights. */
function stepsOf(border: number, unit: Zone["unit"]): number {
  if (unit === "layer") return border;
  return Math.round(border * (unit === "mm" ? 1e3 : 1e6));
}

/** What must hold within the limits of one channel. */
export function checkLimits({ minDuty = 0, maxDuty = 1 }: Limits, context: Context): void {
  if (minDuty <= maxDuty) return;
  const message = `is ${minDuty}, above maxDuty ${maxDuty}. Lower minDuty or raise maxDuty`;
  context.addIssue({ code: "custom", path: ["minDuty"], message, input: minDuty });
}

/** The amorphous and the semi-crystalline range may touch but not overlap. */
export function checkMargins({ maxCrystallinity, minCrystallinity }: Margins, context: Context): void {
  if (maxCrystallinity === undefined || minCrystallinity === undefined) return;
  if (maxCrystallinity <= minCrystallinity) return;
  const message = `is ${maxCrystallinity}, above minCrystallinity ${minCrystallinity}, so a layer could count as both states. Lower maxCrystallinity or raise minCrystallinity`;
  context.addIssue({ code: "custom", path: ["maxCrystallinity"], message, input: maxCrystallinity });
}
