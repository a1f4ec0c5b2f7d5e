import { queryOptions } from "@tanstack/react-query";
import {
  createReading,
  deleteToolpath,
  getLayerLines,
  getReading,
  getReadingDocument,
  getToolpath,
  listToolpaths,
  type Reading,
  type Toolpath,
  uploadToolpath,
} from "#shared/contract/toolpaths.ts";
import { call, urlOf } from "#src/lib/call.ts";
import { type Upload, upload } from "#src/lib/upload.ts";

export const toolpathsQuery = queryOptions({
  queryKey: ["toolpaths"],
  queryFn: ({ signal }) => call(listToolpaths, { signal }),
});

export const toolpathQuery = (id: string) =>
  queryOptions({
    queryKey: ["toolpaths", id],
    queryFn: ({ signal }) => call(getToolpath, { params: { id }, signal }),
  });

export const readingQuery = (id: string) =>
  queryOptions({
    queryKey: ["readings", id],
    queryFn: ({ signal }) => call(getReading, { params: { id }, signal }),
  });

export const readingDocumentQuery = (id: string) =>
  queryOptions({
    queryKey: ["readings", id, "document"],
    queryFn: ({ signal }) => call(getReadingDocument, { params: { id }, signal }),
    staleTime: Infinity, // what was measured in a file never changes
    gcTime: 60_000,
  });

export const layerLinesQuery = (readingId: string, layer: number) =>
  queryOptions({
    queryKey: ["readings", readingId, "lines", layer],
    queryFn: ({ signal }) => call(getLayerLines, { params: { id: readingId }, query: { layer }, signal }),
    staleTime: Infinity,
    gcTime: 60_000,
  });

export const readAgain = (toolpathId: string, machineId: string, machineVersion: number): Promise<Reading> =>
  call(createReading, { params: { id: toolpathId }, body: { machineId, machineVersion } });

export const removeToolpath = (id: string): Promise<undefined> => call(deleteToolpath, { params: { id } });

export function sendToolpath(
  machineId: string,
  task: Omit<Upload, "url">,
): Promise<{ toolpath: Toolpath; reading: Reading }> {
  return upload({ ...task, url: urlOf(uploadToolpath, {}, { machine: machineId }) });
}
