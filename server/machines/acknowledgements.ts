import type { Db } from "#server/db/client.ts";
import type { Actor } from "#server/http/actor.ts";
import { AppError } from "#server/http/app-error.ts";
import * as queries from "#server/machines/queries.ts";
import { machines } from "#server/machines/service.ts";
import type { Acknowledgement } from "#shared/contract/machines.ts";
import { missingItems, SAFETY_CHECKLIST } from "#shared/contract/safety-checklist.ts";

/** Whether a person may download files made for this version of a machine. */
export async function hasAcknowledged(db: Db, key: queries.AcknowledgementKey): Promise<boolean> {
  return (await queries.findAcknowledgement(db, key)) !== undefined;
}

export async function get(db: Db, actor: Actor, machineId: string, machineVersion: number): Promise<Acknowledgement> {
  await machines.stored(db, actor.teamId, machineId, machineVersion);
  const row = await queries.findAcknowledgement(db, { userId: actor.userId, machineId, machineVersion });
  return { checklist: row?.checklist ?? [], at: row?.at.toISOString() ?? null };
}

/** @throws AppError `checklist-incomplete` naming every item that is not ticked */
export async function give(
  db: Db,
  actor: Actor,
  machineId: string,
  machineVersion: number,
  ticked: readonly string[],
): Promise<Acknowledgement> {
  await machines.stored(db, actor.teamId, machineId, machineVersion);
  const missing = missingItems(ticked);
  if (missing.length > 0) {
    throw new AppError("checklist-incomplete", `${missing.length} of the cautions are not ticked.`, {
      remedy: "Tick each one once it holds for this machine.",
      errors: missing.map(({ id, text }) => ({ path: `body.checklist.${id}`, message: text })),
    });
  }
  const checklist = SAFETY_CHECKLIST.map(({ id }) => id);
  await queries.insertAcknowledgement(db, { userId: actor.userId, machineId, machineVersion, checklist });
  return get(db, actor, machineId, machineVersion);
}
