import type { DocumentSummary } from "#shared/contract/documents.ts";
import type { Permission } from "#shared/contract/roles.ts";
import type { Toolpath } from "#shared/contract/toolpaths.ts";
import type { Tuning } from "#shared/contract/tunings.ts";
import { paths } from "#src/app/paths.ts";

/** Something that goes no further until a person does something. */
export interface WaitingItem {
  key: string;
  what: string;
  why: string;
  /** what to do, and where */
  act: string;
  href: string;
}

interface Sources {
  toolpaths?: readonly Toolpath[];
  tunings?: readonly Tuning[];
  profiles?: readonly DocumentSummary[];
  may(permission: Permission): boolean;
}

export const isWritten = ({ tuned }: Tuning): boolean => tuned !== undefined;

/** What can be done with a toolpath next by who may; undefined while it is being read. */
export function nextStep({ id, readings }: Toolpath, may: Sources["may"]): { act: string; href: string } | undefined {
  const reading = readings[0];
  if (!reading || reading.state === "queued" || reading.state === "running") return undefined;
  if (reading.state !== "done") return { act: "See why", href: paths.toolpath(id, reading.id) };
  return may("operate") ? { act: "Tune", href: paths.tune(reading.id) } : undefined;
}

/** What waits for this person, the most pressing first; what they may not do waits for somebody else. */
export function waitingItems({ toolpaths = [], tunings = [], profiles = [], may }: Sources): WaitingItem[] {
  const items: WaitingItem[] = [];
  if (may("operate")) {
    items.push(...toolpaths.flatMap(unreadItems), ...tunings.flatMap(tuningItems));
    const tuned = new Set(tunings.map(({ toolpathId }) => toolpathId));
    items.push(...toolpaths.filter(({ id }) => !tuned.has(id)).flatMap(untunedItems));
  }
  if (may("approve")) items.push(...profiles.flatMap(approvalItems));
  return items;
}

function unreadItems({ id, name, readings }: Toolpath): WaitingItem[] {
  const reading = readings[0];
  if (reading?.state !== "refused" && reading?.state !== "failed") return [];
  const why = reading.refusal ? `not read: ${reading.refusal.message}` : "could not be read: a fault of ours";
  return [{ key: `read-${id}`, what: name, why, act: "See why", href: paths.toolpath(id, reading.id) }];
}

function tuningItems(tuning: Tuning): WaitingItem[] {
  const { id, fileName, machineName, profileName, profileVersion, state, refusal, acknowledged } = tuning;
  const profile = `with ${profileName}, version ${profileVersion}`;
  const item = { key: `tuning-${id}`, what: fileName, href: paths.tuning(id) };
  if (state === "refused" || state === "failed") {
    return [
      {
        ...item,
        why: refusal
          ? `not written ${profile}: ${refusal.message}`
          : `could not be written ${profile}: a fault of ours`,
        act: "See why",
      },
    ];
  }
  if (state !== "done" || acknowledged) return [];
  return [
    {
      ...item,
      why: `written ${profile}; ${machineName} needs your checklist before you can download it`,
      act: "Checklist",
    },
  ];
}

function untunedItems({ id, name, readings }: Toolpath): WaitingItem[] {
  const reading = readings.find(({ state }) => state === "done");
  if (!reading) return [];
  return [
    {
      key: `tune-${id}`,
      what: name,
      why: `read for ${reading.machineName}, not tuned yet`,
      act: "Tune",
      href: paths.tune(reading.id),
    },
  ];
}

function approvalItems({ id, name, latest, approved = [] }: DocumentSummary): WaitingItem[] {
  if (approved.includes(latest.number)) return [];
  const before = approved.length === 0 ? "no version is approved" : `version ${approved.at(-1)} is the last approved`;
  const href = paths.document("profiles", id, latest.number);
  return [
    {
      key: `approve-${id}`,
      what: name,
      why: `version ${latest.number} by ${latest.createdBy}; ${before}`,
      act: "Review",
      href,
    },
  ];
}
