import { z } from "zod";
import { Count, Id, Instant, RefusalReport, StoredFile, VersionNumber } from "#shared/contract/common.ts";
import { endpoint } from "#shared/contract/endpoint.ts";
import { JobState } from "#shared/contract/jobs.ts";
import { LayerLines, PartOutline } from "#shared/contract/toolpaths.ts";
import { PlanDocument } from "#shared/formats/plan.ts";
import { ProofDocument } from "#shared/formats/proof.ts";

/** One application of a profile version to a toolpath on a machine. */
export const Tuning = z.object({
  id: Id,
  readingId: Id,
  toolpathId: Id,
  toolpathName: z.string(),
  machineId: Id,
  machineVersion: VersionNumber,
  machineName: z.string(),
  profileId: Id,
  profileVersion: VersionNumber,
  profileName: z.string(),
  /** the card it was tuned with; left out where there was none */
  polymerId: Id.optional(),
  polymerVersion: VersionNumber.optional(),
  /** `approved` when the profile version was at the time */
  status: z.enum(["trial-only", "approved"]),
  state: JobState,
  jobId: Id,
  createdAt: Instant,
  createdBy: z.string(),
  original: StoredFile,
  outline: PartOutline.optional(),
  /** of state `refused` */
  refusal: RefusalReport.optional(),
  /** of state `done`, as are the next two */
  tuned: StoredFile.optional(),
  plan: z
    .object({
      layers: Count,
      advice: Count,
      /** what the profile wants of each band of the toolpath's outline; left out in tunings made before there were any */
      targets: z.array(z.enum(["amorphous", "semi-crystalline", "undecided", "none"])).optional(),
    })
    .optional(),
  proof: z.object({ passed: z.boolean(), checks: Count }).optional(),
  /** the name it is downloaded under */
  fileName: z.string(),
  /** the caller has acknowledged the cautions of this version of the machine */
  acknowledged: z.boolean(),
});
export type Tuning = z.infer<typeof Tuning>;

/** 403 `version-not-approved` for who may tune with approved versions only; 409 `not-ready` while the reading runs */
export const createTuning = endpoint({
  method: "POST",
  path: "/api/tunings",
  allows: "operate",
  body: z.strictObject({ readingId: Id, profileId: Id, profileVersion: VersionNumber }),
  reply: Tuning,
  status: 201,
});

export const listTunings = endpoint({
  method: "GET",
  path: "/api/tunings",
  allows: "read",
  reply: z.array(Tuning),
});

export const getTuning = endpoint({ method: "GET", path: "/api/tunings/:id", allows: "read", reply: Tuning });

/** 409 `not-ready` before the tuning is done, here and below */
export const getTuningPlan = endpoint({
  method: "GET",
  path: "/api/tunings/:id/plan",
  allows: "read",
  reply: PlanDocument,
});

export const getTuningProof = endpoint({
  method: "GET",
  path: "/api/tunings/:id/proof",
  allows: "read",
  reply: ProofDocument,
});

/** Lines of both files that correspond. */
export const DiffHunk = z.object({
  original: LayerLines.omit({ truncated: true }),
  tuned: LayerLines.omit({ truncated: true }),
});
export type DiffHunk = z.infer<typeof DiffHunk>;

/** Both sides of one layer, as one hunk; of a layer that is too long for that, every change with some lines around it. */
export const LayerDiff = z.object({
  /** ascending; what lies between two of them is the same in both files but for line numbers */
  hunks: z.array(DiffHunk),
  /** `first-changes`: there are more than are sent at once */
  shows: z.enum(["layer", "changes", "first-changes"]),
});
export type LayerDiff = z.infer<typeof LayerDiff>;

/** From a layer's write position to the next layer's. */
export const getLayerDiff = endpoint({
  method: "GET",
  path: "/api/tunings/:id/layers/:index/diff",
  allows: "read",
  reply: LayerDiff,
});

/** Indices of the layers in which a line was inserted or removed, ascending. */
export const getTuningChanges = endpoint({
  method: "GET",
  path: "/api/tunings/:id/changes",
  allows: "read",
  reply: z.array(z.int().min(1)),
});

/** The tuned file, with ETag and ranges. 409 `acknowledge-first` until the caller has acknowledged the machine's cautions. */
export const downloadTunedFile = endpoint({
  method: "GET",
  path: "/api/tunings/:id/file",
  allows: "operate",
  reply: "stream",
});
