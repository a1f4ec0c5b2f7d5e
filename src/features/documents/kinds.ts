import { queryOptions } from "@tanstack/react-query";
import type { z } from "zod";
import type { DocumentHistory, DocumentSummary, VersionHead } from "#shared/contract/documents.ts";
import * as machines from "#shared/contract/machines.ts";
import * as polymers from "#shared/contract/polymers.ts";
import * as profiles from "#shared/contract/profiles.ts";
import { Machine, parseMachine, writeMachine } from "#shared/formats/machine.ts";
import { Polymer, parsePolymer, writePolymer } from "#shared/formats/polymer.ts";
import { Profile, parseProfile, writeProfile } from "#shared/formats/profile.ts";
import { call } from "#src/lib/call.ts";

/** A version with its document. */
export interface Version<Document> extends VersionHead {
  id: string;
  document: Document;
}

/** Machines, profiles and polymers are kept alike: named documents in versions, none of which is ever overwritten. */
export interface DocumentKind<Document extends { name: string }> {
  noun: string;
  plural: string;
  schema: z.ZodType<Document>;
  parse(json: unknown): Document;
  /** as a file, which names the version where documents of the kind can */
  write(document: Document, version: number): string;
  list(signal?: AbortSignal): Promise<DocumentSummary[]>;
  history(id: string, signal?: AbortSignal): Promise<DocumentHistory>;
  version(id: string, number: number, signal?: AbortSignal): Promise<Version<Document>>;
  create(document: Document, note?: string): Promise<Version<Document>>;
  createVersion(id: string, basedOn: number, document: Document, note?: string): Promise<Version<Document>>;
}

export const MACHINES: DocumentKind<Machine> = {
  noun: "machine",
  plural: "machines",
  schema: Machine,
  parse: parseMachine,
  write: (machine, version) => writeMachine({ ...machine, version }),
  list: (signal) => call(machines.listMachines, { signal }),
  history: (id, signal) => call(machines.getMachine, { params: { id }, signal }),
  version: (id, number, signal) => call(machines.getMachineVersion, { params: { id, number }, signal }),
  create: (document, note) => call(machines.createMachine, { body: { document, note } }),
  createVersion: (id, basedOn, document, note) =>
    call(machines.createMachineVersion, { params: { id }, body: { basedOn, document, note } }),
};

export const PROFILES: DocumentKind<Profile> = {
  noun: "profile",
  plural: "profiles",
  schema: Profile,
  parse: parseProfile,
  write: (profile, version) => writeProfile({ ...profile, version }),
  list: (signal) => call(profiles.listProfiles, { signal }),
  history: (id, signal) => call(profiles.getProfile, { params: { id }, signal }),
  version: (id, number, signal) => call(profiles.getProfileVersion, { params: { id, number }, signal }),
  create: (document, note) => call(profiles.createProfile, { body: { document, note } }),
  createVersion: (id, basedOn, document, note) =>
    call(profiles.createProfileVersion, { params: { id }, body: { basedOn, document, note } }),
};

export const POLYMERS: DocumentKind<Polymer> = {
  noun: "polymer",
  plural: "polymers",
  schema: Polymer,
  parse: parsePolymer,
  write: writePolymer,
  list: (signal) => call(polymers.listPolymers, { signal }),
  history: (id, signal) => call(polymers.getPolymer, { params: { id }, signal }),
  version: (id, number, signal) => call(polymers.getPolymerVersion, { params: { id, number }, signal }),
  create: (document, note) => call(polymers.createPolymer, { body: { document, note } }),
  createVersion: (id, basedOn, document, note) =>
    call(polymers.createPolymerVersion, { params: { id }, body: { basedOn, document, note } }),
};

export const approveProfile = (id: string, number: number): Promise<VersionHead> =>
  call(profiles.approveProfileVersion, { params: { id, number } });

type Kind<Document extends { name: string }> = DocumentKind<Document>;

export const documentsQuery = <D extends { name: string }>(kind: Kind<D>) =>
  queryOptions({ queryKey: [kind.plural], queryFn: ({ signal }) => kind.list(signal) });

export const historyQuery = <D extends { name: string }>(kind: Kind<D>, id: string) =>
  queryOptions({ queryKey: [kind.plural, id], queryFn: ({ signal }) => kind.history(id, signal) });

export const versionQuery = <D extends { name: string }>(kind: Kind<D>, id: string, number: number) =>
  queryOptions({
    queryKey: [`${kind.noun}-version`, id, number],
    queryFn: ({ signal }) => kind.version(id, number, signal),
    staleTime: Infinity, // versions are never changed
  });
