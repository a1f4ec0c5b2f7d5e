import type { Profile } from "#shared/formats/profile.ts";

/** One zone that drives nothing: channels are added to it. */
export function newProfile(polymer: string): Profile {
  return {
    format: "quenchline.profile/1",
    name: "New profile",
    polymer,
    bedLayers: { count: 0, duty: {} },
    zones: [{ name: "whole part", from: 0, unit: "mm", target: "none", rampMm: 0, cooling: [], heating: [] }],
    limits: {},
    lead: {},
    withinLayer: "replace",
  };
}
