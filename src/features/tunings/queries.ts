import { queryOptions } from "@tanstack/react-query";
import {
  createTuning,
  getLayerDiff,
  getTuning,
  getTuningChanges,
  getTuningPlan,
  getTuningProof,
  listTunings,
  type Tuning,
} from "#shared/contract/tunings.ts";
import { call } from "#src/lib/call.ts";

export const tuningsQuery = queryOptions({
  queryKey: ["tunings"],
  queryFn: ({ signal }) => call(listTunings, { signal }),
});

export const tuningQuery = (id: string) =>
  queryOptions({
    queryKey: ["tunings", id],
    queryFn: ({ signal }) => call(getTuning, { params: { id }, signal }),
  });

// What a finished tuning has left behind never changes. These stand apart from ["tunings"], which a job's end makes
// stale as a whole.
export const tuningPlanQuery = (id: string) =>
  queryOptions({
    queryKey: ["tuned", id, "plan"],
    queryFn: ({ signal }) => call(getTuningPlan, { params: { id }, signal }),
    staleTime: Infinity,
  });

export const tuningProofQuery = (id: string) =>
  queryOptions({
    queryKey: ["tuned", id, "proof"],
    queryFn: ({ signal }) => call(getTuningProof, { params: { id }, signal }),
    staleTime: Infinity,
  });

export const tuningChangesQuery = (id: string) =>
  queryOptions({
    queryKey: ["tuned", id, "changes"],
    queryFn: ({ signal }) => call(getTuningChanges, { params: { id }, signal }),
    staleTime: Infinity,
  });

export const layerDiffQuery = (id: string, layer: number) =>
  queryOptions({
    queryKey: ["tuned", id, "diff", layer],
    queryFn: ({ signal }) => call(getLayerDiff, { params: { id, index: layer }, signal }),
    staleTime: Infinity,
    gcTime: 60_000,
  });

export const writeTuning = (readingId: string, profileId: string, profileVersion: number): Promise<Tuning> =>
  call(createTuning, { body: { readingId, profileId, profileVersion } });
