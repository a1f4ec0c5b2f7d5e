import { readdir, readFile } from "node:fs/promises";
import { join } from "node:path";
import type { Documents } from "#server/documents/service.ts";
import { keptSecret } from "#server/kept-secret.ts";
import { machines } from "#server/machines/service.ts";
import type { Parts } from "#server/parts.ts";
import { polymers } from "#server/polymers/service.ts";
import { profiles } from "#server/profiles/service.ts";
import { ROOT } from "#server/root.ts";
import { addMember, findMember, hasTeams, insertTeam } from "#server/teams/service.ts";
import { seedToolpaths } from "#server/toolpaths/seed.ts";
import { Role } from "#shared/contract/roles.ts";

const TEAM = "Alder Bay Instruments";
const DOMAIN = "alderbay.example";
const SAMPLES = join(ROOT, "samples");
const addressOf = (role: Role): string => `${role}@${DOMAIN}`;

/**
 * Gives a database without any team the demo's: four people, the sample documents, toolpaths and one tuning. Goes on
 * where an earlier start was broken off.
 */
export async function seedDemo(parts: Parts): Promise<void> {
  const { db, env } = parts;
  if (!env.SEED_DEMO) return;
  const operator = (await hasTeams(db)) ? await findMember(db, addressOf("operator")) : await seedTeam(parts);
  if (operator) await seedToolpaths(parts, operator);
}

/** People and documents, all or none. @returns the operator */
async function seedTeam(parts: Parts): Promise<{ userId: string; teamId: string }> {
  const { db, log } = parts;
  const password = await demoPassword(parts);
  log.info({ team: TEAM }, "making the demo team");
  return db.transaction(async (tx) => {
    const teamId = await insertTeam(tx, TEAM);
    const people = {} as Record<Role, { userId: string; teamId: string }>;
    for (const role of Role.options) {
      const { id } = await addMember(tx, teamId, { email: addressOf(role), role, password });
      people[role] = { userId: id, teamId };
    }
    await seedDocuments(tx, machines, "machines", people.engineer);
    await seedDocuments(tx, polymers, "polymers", people.engineer);
    const seeded = await seedDocuments(tx, profiles, "profiles", people.engineer);
    // One is left for the lead to approve.
    for (const id of seeded.slice(0, -1)) await profiles.approve(tx, people.lead, id, 1);
    return people.operator;
  });
}

async function seedDocuments<Document>(
  db: Parts["db"],
  documents: Documents<Document>,
  folder: string,
  writer: { userId: string; teamId: string },
): Promise<string[]> {
  const ids: string[] = [];
  for (const name of (await readdir(join(SAMPLES, folder))).sort()) {
    const json = JSON.parse(await readFile(join(SAMPLES, folder, name), "utf8"));
    const draft = { document: documents.format.parse(json), note: "Sample" };
    ids.push((await documents.create(db, writer, draft)).id);
  }
  return ids;
}

/** What to tell whoever starts the server; nothing where there is no demo team. */
export async function demoSignIns(parts: Parts): Promise<string> {
  if (!parts.env.SEED_DEMO || !(await findMember(parts.db, addressOf("lead")))) return "";
  const people = Role.options.map((role) => `  ${addressOf(role)}\n`).join("");
  return `Demo team ${TEAM}; the password of each is ${await demoPassword(parts)}\n${people}`;
}

function demoPassword({ env }: Parts): Promise<string> {
  return env.DEMO_PASSWORD === undefined
    ? keptSecret(env.DATA_DIR, "demo-password", 9)
    : Promise.resolve(env.DEMO_PASSWORD);
}
