import type { Page } from "playwright-core";
import { barriers } from "#tests/e2e/browser.ts";

/** An address of each kind of page, filled in from the demo's data. */
export async function everyPage(page: Page, url: string): Promise<string[]> {
  const first = async (resource: string, named = "") => {
    const list: { id: string; name?: string }[] = await (await page.request.get(`${url}/api/${resource}`)).json();
    return list.find(({ name }) => name?.includes(named)) ?? list[0];
  };
  const toolpath = (await first("toolpaths", "mast")) as { id: string; readings?: { id: string }[] };
  const reading = toolpath.readings?.[0].id;
  const [tuning, machine, profile, polymer] = await Promise.all([
    first("tunings"),
    first("machines", "Tern"),
    first("profiles", "Seal ring"),
    first("polymers", "PEEK"),
  ]);
  const mast = await first("profiles", "Mast bracket, stiff foot");
  const throughout = await first("profiles", "Mast bracket, stiff throughout");
  const amorphous = await first("polymers", "PEI");
  return [
    "/",
    `/toolpaths/${toolpath.id}?layer=40`,
    `/readings/${reading}/tune?profile=${mast.id}&layer=40`,
    `/readings/${reading}/compare?a=${mast.id}&b=${throughout.id}&layer=40`,
    `/tunings/${tuning.id}?layer=4`,
    "/machines",
    "/machines/new",
    `/machines/${machine.id}`,
    `/machines/${machine.id}/edit`,
    "/profiles",
    "/profiles/new",
    `/profiles/${profile.id}`,
    `/profiles/${profile.id}/edit`,
    `/profiles/${profile.id}/compare?from=1&to=1`,
    "/polymers",
    "/polymers/new",
    `/polymers/${polymer.id}`,
    `/polymers/${amorphous.id}`,
    `/polymers/${polymer.id}/edit`,
    "/members",
    "/nowhere",
  ];
}

export async function inBothSheets(page: Page): Promise<string[]> {
  const faults: string[] = [];
  for (const colorScheme of ["light", "dark"] as const) {
    await page.emulateMedia({ colorScheme });
    faults.push(...(await barriers(page)).map((fault) => `${colorScheme}: ${fault}`));
  }
  await page.setViewportSize({ width: 1024, height: 768 });
  const over = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
  if (over > 0) faults.push(`${over} px wider than a tablet`);
  await page.setViewportSize({ width: 1440, height: 950 });
  return faults;
}
