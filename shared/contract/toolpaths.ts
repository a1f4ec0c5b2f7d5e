import { z } from "zod";
import { Count, Id, Instant, RefusalReport, StoredFile, VersionNumber } from "#shared/contract/common.ts";
import { endpoint } from "#shared/contract/endpoint.ts";
import { JobState } from "#shared/contract/jobs.ts";
import { ReadingDocument } from "#shared/formats/reading.ts";

/** The part from the side, coarsely: bands from the bottom up, each reaching from left to right as shares of the width. */
export const PartOutline = z.object({
  widthMm: z.number(),
  heightMm: z.number(),
  bands: z.array(z.tuple([z.number(), z.number()]).nullable()),
});
export type PartOutline = z.infer<typeof PartOutline>;

/** A toolpath read with one version of a machine. */
export const Reading = z.object({
  id: Id,
  toolpathId: Id,
  machineId: Id,
  machineVersion: VersionNumber,
  machineName: z.string(),
  state: JobState,
  jobId: Id,
  createdAt: Instant,
  /** of state `refused` */
  refusal: RefusalReport.optional(),
  /** of state `done` */
  summary: z
    .object({
      lines: Count,
      layers: Count,
      heightMm: z.number(),
      printTimeS: z.number(),
      depositedLengthMm: z.number(),
      filamentMm: z.number(),
      warnings: Count,
      /** left out in readings made before there were outlines */
      outline: PartOutline.optional(),
    })
    .optional(),
});
export type Reading = z.infer<typeof Reading>;

/** An uploaded file. Size and digest are those of the unpacked bytes. */
export const Toolpath = z.object({
  id: Id,
  /** name it was uploaded under, without `.gz` */
  name: z.string(),
  ...StoredFile.shape,
  createdAt: Instant,
  createdBy: z.string(),
  /** the latest first */
  readings: z.array(Reading),
});
export type Toolpath = z.infer<typeof Toolpath>;

/** Lines of a layer, as they stand in the file. */
export const LayerLines = z.object({
  firstLine: z.int().min(1),
  text: z.string(),
  /** the layer is longer than what is sent */
  truncated: z.boolean(),
});
export type LayerLines = z.infer<typeof LayerLines>;

/** Stores the file and begins to read it with the latest version of the machine. */
export const uploadToolpath = endpoint({
  method: "POST",
  path: "/api/toolpaths",
  allows: "operate",
  query: z.strictObject({ machine: Id }),
  body: "file",
  reply: z.object({ toolpath: Toolpath, reading: Reading }),
  status: 201,
});

export const listToolpaths = endpoint({
  method: "GET",
  path: "/api/toolpaths",
  allows: "read",
  reply: z.array(Toolpath),
});

export const getToolpath = endpoint({ method: "GET", path: "/api/toolpaths/:id", allows: "read", reply: Toolpath });

/** 409 `in-use` while a tuning was made from it */
export const deleteToolpath = endpoint({
  method: "DELETE",
  path: "/api/toolpaths/:id",
  allows: "operate",
  reply: "nothing",
});

/** Reads it again with another machine or version; an equal reading that is there already is answered instead. */
export const createReading = endpoint({
  method: "POST",
  path: "/api/toolpaths/:id/readings",
  allows: "operate",
  body: z.strictObject({ machineId: Id, machineVersion: VersionNumber }),
  reply: Reading,
  status: 201,
});

export const getReading = endpoint({ method: "GET", path: "/api/readings/:id", allows: "read", reply: Reading });

/** 409 `not-ready` before the reading is done, here and below */
export const getReadingDocument = endpoint({
  method: "GET",
  path: "/api/readings/:id/document",
  allows: "read",
  reply: ReadingDocument,
});

export const getLayersCsv = endpoint({
  method: "GET",
  path: "/api/readings/:id/layers.csv",
  allows: "read",
  reply: "stream",
});

export const getLayerLines = endpoint({
  method: "GET",
  path: "/api/readings/:id/lines",
  allows: "read",
  query: z.strictObject({ layer: z.coerce.number<string | number>().int().min(1).max(1e9) }),
  reply: LayerLines,
});
