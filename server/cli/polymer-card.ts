import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { loadPolymer } from "#server/cli/documents.ts";
import { InputRefused } from "#server/cli/exit.ts";
import { ROOT } from "#server/root.ts";
import { isCardFor } from "#shared/formats/fit.ts";
import { type Polymer, parsePolymer } from "#shared/formats/polymer.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { Refusal } from "#shared/refusal.ts";

const SHIPPED = "samples/polymers";

/** A card, and what has to be said where nobody chose it. */
export interface FoundCard {
  polymer: Polymer;
  notice?: string;
}

/**
 * The card that a profile is computed with: the one given, or else the one of the profile's polymer that comes with
 * Quenchline. Two cards of one name may differ, and which one is meant decides the result, so taking it is told.
 *
 * @param given name of a file
 * @throws InputRefused where no card was given and none of that name comes with Quenchline
 */
export async function cardFor(profile: Profile, profileName: string, given: string | undefined): Promise<FoundCard> {
  if (given !== undefined) return { polymer: await loadPolymer(given) };
  for (const name of readdirSync(join(ROOT, SHIPPED))) {
    const polymer = parsePolymer(JSON.parse(readFileSync(join(ROOT, SHIPPED, name), "utf8")));
    if (!isCardFor(polymer, profile)) continue;
    const notice = `No polymer card was given: the one of ${polymer.name} that comes with Quenchline (${SHIPPED}/${name}) was taken. Give your own with --polymer.`;
    return { polymer, notice };
  }
  const refusal = new Refusal(
    "polymer-missing",
    `The profile "${profile.name}" is for ${profile.polymer}, of which no card was given and none comes with Quenchline.`,
    "Give the card with --polymer.",
    { path: "polymer" },
  );
  throw new InputRefused(refusal, profileName);
}
