import { execFile } from "node:child_process";
import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { promisify } from "node:util";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { parseProfile, writeProfile } from "#shared/formats/profile.ts";
import { barriers, hasBrowser, openBrowser, openPage, picture, signIn } from "#tests/e2e/browser.ts";
import { type RunningApp, runApp } from "#tests/e2e/running-app.ts";

const ROOT = join(import.meta.dirname, "../..");
const SAMPLE = join(ROOT, "samples/seal-ring.gcode");
const run = promisify(execFile);
const sample = (name: string): unknown => JSON.parse(readFileSync(join(ROOT, "samples", name), "utf8"));

describe.skipIf(!hasBrowser)("the whole job in a browser", () => {
  let app: RunningApp;
  let browser: Browser;
  beforeAll(async () => {
    app = await runApp();
    browser = await openBrowser();
  });
  afterAll(async () => {
    await browser?.close();
    await app?.close();
  });

  test("a toolpath is dropped, a curve point moved, the tuned file written, looked at and downloaded: the command line's bytes", async () => {
    const { page, complaints } = await openPage(browser);
    await signIn(page, app.url, "engineer");
    await picture(page, "floor");

    await page.getByLabel("Machine").selectOption({ label: "Tern" });
    await dropFile(page, "ring-42.gcode", readFileSync(SAMPLE));
    await page.getByRole("link", { name: "Tune", exact: true }).waitFor();
    await pinByKey(page, 12);
    await picture(page, "toolpath");

    await page.getByRole("link", { name: "Tune", exact: true }).click();
    await page.getByLabel("Profile", { exact: true }).selectOption({ label: "Seal ring, stiff base and tough lip" });
    await pinByKey(page, 12);
    await movePoint(page);
    await picture(page, "tune");

    await page.getByRole("button", { name: "Write tuned file" }).click();
    await page.getByLabel("Why").fill("More cooling for the base");
    await page.getByRole("dialog").getByRole("button", { name: "Write tuned file" }).click();
    await page.getByText(/All \d+ checks passed/).waitFor();
    await picture(page, "tuning");

    await findChange(page);
    await picture(page, "diff");

    const tuned = await download(page);
    const expected = await commandLine(page, app);
    expectSameFile(tuned, expected);
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test("documents live in versions: approved, compared, restored as a new one, exported and imported", async () => {
    const { page, complaints } = await openPage(browser);
    await signIn(page, app.url, "lead");
    await page.getByRole("link", { name: "Profiles", exact: true }).click();
    await page.getByRole("link", { name: "Valve plate, flat and stiff" }).click();
    await page.getByRole("button", { name: "Approve" }).click();
    await page.getByText(/by lead@alderbay.example on/).waitFor();

    await page.getByRole("link", { name: "Edit" }).click();
    await page.getByLabel("Name", { exact: true }).fill("Valve plate, flat, stiff and renamed");
    await page.getByRole("button", { name: "Save as a new version" }).click();
    await page.getByLabel("Why").fill("A better name");
    await page.getByRole("dialog").getByRole("button", { name: "Save" }).click();
    await page.getByText("version 2, the latest, not approved").waitFor();

    await page.getByRole("link", { name: "Compare with 1" }).click();
    const table = page.getByRole("region", { name: "Version 1 and Version 2" });
    await table.waitFor();
    expect(await table.getByRole("row").count()).toBe(2);
    await page.getByRole("link", { name: "To the profile" }).click();
    await page.getByRole("button", { name: "Restore as 3" }).click();
    await page.getByRole("dialog").getByRole("button", { name: "Restore as version 3" }).click();
    await page.getByRole("heading", { name: "Valve plate, flat and stiff" }).waitFor();

    const waiting = page.waitForEvent("download");
    await page.getByRole("button", { name: "Export JSON" }).click();
    const exported = readFileSync(await (await waiting).path(), "utf8");
    expect(exported).toBe(writeProfile(parseProfile(sample("profiles/valve-plate-flat-and-stiff.json"))));

    await page.getByRole("link", { name: "Profiles", exact: true }).click();
    const input = page.getByLabel("JSON file of a profile");
    const file = (text: string) => ({ name: "p.json", mimeType: "application/json", buffer: Buffer.from(text) });
    await input.setInputFiles(file(exported.replace("0.", "7.")));
    await page
      .getByRole("dialog", { name: "Not imported" })
      .getByText(/must be between 0 and 1/)
      .first()
      .waitFor();
    await page.getByRole("button", { name: "Put away" }).click();
    await input.setInputFiles(file(exported.replace("Valve plate, flat and stiff", "Imported plate")));
    await page.getByRole("heading", { name: "Imported plate" }).waitFor();
    expect(complaints.filter((text) => !/status of 4\d\d/.test(text))).toEqual([]);
    await page.context().close();
  });

  test("a toolpath is read again for another machine", async () => {
    const { page, complaints } = await openPage(browser);
    await signIn(page, app.url, "operator");
    await page.getByRole("link", { name: "valve-plate.gcode", exact: true }).click();
    await page.getByRole("button", { name: "Read for another machine" }).click();
    await page.getByRole("dialog").getByLabel("Machine").selectOption({ label: "Fulmar" });
    await page.getByRole("dialog").getByRole("button", { name: "Read" }).click();
    await page.getByLabel("Read for", { exact: true }).waitFor();
    await page.getByText("Print time, without waits").waitFor();
    const shown = page.getByLabel("Read for", { exact: true }).locator("option:checked");
    expect(await shown.textContent()).toBe("Fulmar, version 1");
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test("no page puts up barriers, on the light sheet or the dark one, nor is wider than a tablet", async () => {
    const { page, complaints } = await openPage(browser);
    await page.goto(`${app.url}/sign-in`);
    const found: Record<string, string[]> = { "sign-in": await inBothSheets(page) };
    await signIn(page, app.url, "lead");
    for (const path of await everyPage(page, app.url)) {
      await page.goto(app.url + path);
      await page.getByRole("heading", { level: 1 }).waitFor();
      await expect.poll(() => page.getByRole("status").filter({ hasText: /…$/ }).count(), { timeout: 20_000 }).toBe(0);
      if (path.startsWith("/tunings/")) await page.locator(".view-line").first().waitFor();
      found[path] = await inBothSheets(page);
    }
    expect(Object.keys(found).length).toBeGreaterThan(15);
    expect(Object.fromEntries(Object.entries(found).filter(([, faults]) => faults.length > 0))).toEqual({});
    expect(complaints).toEqual([]);
    await page.context().close();
  });
});

/** An address of each kind of page, filled in from the demo's data. */
async function everyPage(page: Page, url: string): Promise<string[]> {
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
  const mast = await first("profiles", "Mast bracket");
  return [
    "/",
    `/toolpaths/${toolpath.id}?layer=40`,
    `/readings/${reading}/tune?profile=${mast.id}&layer=40`,
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
    `/polymers/${polymer.id}/edit`,
    "/members",
    "/nowhere",
  ];
}

async function inBothSheets(page: Page): Promise<string[]> {
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

/** As a hand would: the file is let go over the page. */
async function dropFile(page: Page, name: string, bytes: Buffer): Promise<void> {
  const transfer = await page.evaluateHandle(
    ([fileName, text]) => {
      const data = new DataTransfer();
      data.items.add(new File([text], fileName));
      return data;
    },
    [name, bytes.toString("latin1")],
  );
  await page.dispatchEvent("body", "dragenter", { dataTransfer: transfer });
  await page.getByText("Let go to read it for Tern").waitFor();
  await page.dispatchEvent("body", "drop", { dataTransfer: transfer });
}

async function pinByKey(page: Page, layer: number): Promise<void> {
  const log = page.getByRole("slider", { name: /pinned layer/ });
  await log.focus();
  await page.keyboard.press("Home");
  for (let n = 1; n < layer; n++) await page.keyboard.press("ArrowUp");
  expect(await log.getAttribute("aria-valuenow")).toBe(String(layer));
}

/** Raises the first point of the base's cooling curve with the keyboard; the plan follows at once. */
async function movePoint(page: Page): Promise<void> {
  await page.getByRole("button", { name: /^Zone base/ }).click();
  const point = page.getByRole("slider", { name: /^Point 3 of 3/ });
  const before = Number(await point.getAttribute("aria-valuenow"));
  await page.getByRole("tab", { name: "Layer 12" }).click();
  const planned = page.locator("dt", { hasText: "as planned" }).first().locator("xpath=following-sibling::dd");
  const plannedBefore = await planned.textContent();
  await page.getByRole("tab", { name: "Profile" }).click();
  await point.focus();
  for (let n = 0; n < 5; n++) await page.keyboard.press("ArrowUp");
  expect(Number(await point.getAttribute("aria-valuenow"))).toBeGreaterThan(before);
  await page.getByRole("tab", { name: "Layer 12" }).click();
  await expect.poll(() => planned.textContent()).not.toBe(plannedBefore);
  await page.getByRole("tab", { name: "Profile" }).click();
}

async function findChange(page: Page): Promise<void> {
  await page.getByRole("button", { name: /^First changed layer/ }).click();
  await page.getByText(/\d+ places? changed/).waitFor();
  await page.getByRole("button", { name: "Next change" }).click();
  await page.locator(".view-line", { hasText: ";ql" }).first().waitFor();
  expect(await page.locator(".diff-fan").count()).toBeGreaterThan(1);
}

async function download(page: Page): Promise<Buffer> {
  await page.getByRole("button", { name: "Download …" }).click();
  const dialog = page.getByRole("dialog");
  const items = dialog.getByRole("checkbox");
  await items.first().waitFor();
  for (const item of await items.all()) await item.check();
  await picture(page, "checklist");
  await dialog.getByRole("button", { name: "I have made sure" }).click();
  const waiting = page.waitForEvent("download");
  await page.getByRole("link", { name: /^Download/ }).click();
  const file = await waiting;
  expect(file.suggestedFilename()).toBe("ring-42.tuned.gcode");
  return readFileSync(await file.path());
}

/** The same toolpath, machine and profile, as the program on the command line tunes them. */
async function commandLine(page: Page, { url, folder }: RunningApp): Promise<Buffer> {
  const get = async (path: string) => (await page.request.get(url + path)).json();
  const tuning = await get(`/api/tunings/${new URL(page.url()).pathname.split("/").at(-1)}`);
  expect(tuning).toMatchObject({ profileVersion: 2, status: "trial-only", acknowledged: true });
  const { document } = await get(`/api/profiles/${tuning.profileId}/versions/${tuning.profileVersion}`);
  const profile = join(folder, "profile.json");
  writeFileSync(profile, JSON.stringify(document));
  const out = join(folder, "tuned.gcode");
  const machine = join(ROOT, "samples/machines/tern.json");
  const argv = ["tune", SAMPLE, "--machine", machine, "--profile", profile, "--out", out];
  await run(process.execPath, [join(ROOT, "server/cli/launch.mjs"), ...argv], { cwd: ROOT });
  return readFileSync(out);
}

const PROVENANCE = /^;quenchline (\{.*\})\r?$/m;

/**
 * Byte for byte, but for what only a team's database knows: the numbers of the versions, which stand in the provenance
 * line and nowhere else.
 */
function expectSameFile(tuned: Buffer, expected: Buffer): void {
  const [ours, theirs] = [tuned.toString("latin1"), expected.toString("latin1")];
  const said = JSON.parse(PROVENANCE.exec(ours)![1]);
  expect([said.profile.version, said.machine.version]).toEqual([2, 1]);
  delete said.profile.version;
  delete said.machine.version;
  expect(said).toEqual(JSON.parse(PROVENANCE.exec(theirs)![1]));
  expect(ours.replace(PROVENANCE, "") === theirs.replace(PROVENANCE, "")).toBe(true);
}
