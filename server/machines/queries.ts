import { and, eq } from "drizzle-orm";
import type { Db } from "#server/db/client.ts";
import { acknowledgements } from "#server/db/schema/documents.ts";

/** Whose acknowledgement, of which version of which machine. */
export interface AcknowledgementKey {
  userId: string;
  machineId: string;
  machineVersion: number;
}

export async function findAcknowledgement(db: Db, { userId, machineId, machineVersion }: AcknowledgementKey) {
  const [row] = await db
    .select({ checklist: acknowledgements.checklist, at: acknowledgements.at })
    .from(acknowledgements)
    .where(
      and(
        eq(acknowledgements.userId, userId),
        eq(acknowledgements.machineId, machineId),
        eq(acknowledgements.machineVersion, machineVersion),
      ),
    );
  return row;
}

/** The first acknowledgement stays. */
export async function insertAcknowledgement(
  db: Db,
  acknowledgement: AcknowledgementKey & { checklist: string[] },
): Promise<void> {
  await db.insert(acknowledgements).values(acknowledgement).onConflictDoNothing();
}
