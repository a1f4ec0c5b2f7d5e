import { execFile } from "node:child_process";
import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { promisify } from "node:util";
import type { Page } from "playwright-core";
import { expect } from "vitest";
import { picture } from "#tests/e2e/browser.ts";
import type { RunningApp } from "#tests/e2e/running-app.ts";

const ROOT = join(import.meta.dirname, "../..");
export const SAMPLE = join(ROOT, "samples/seal-ring.gcode");
const run = promisify(execFile);
export const sample = (name: string): unknown => JSON.parse(readFileSync(join(ROOT, "samples", name), "utf8"));

/** As a hand would: the file is let go over the page. */
export async function dropFile(page: Page, name: string, bytes: Buffer): Promise<void> {
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

export async function pinByKey(page: Page, layer: number): Promise<void> {
  const log = page.getByRole("slider", { name: /pinned layer/ });
  await log.focus();
  await page.keyboard.press("Home");
  for (let n = 1; n < layer; n++) await page.keyboard.press("ArrowUp");
  expect(await log.getAttribute("aria-valuenow")).toBe(String(layer));
}

/** Raises the first point of the base's cooling curve with the keyboard; the plan follows at once. */
export async function movePoint(page: Page): Promise<void> {
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

export async function findChange(page: Page): Promise<void> {
  const log = page.getByRole("slider", { name: /pinned layer/ });
  await log.focus();
  await page.keyboard.press("Escape");
  await page.getByRole("button", { name: /^First changed layer/ }).click();
  await page.getByText(/\d+ places? changed/).waitFor();
  await page.getByRole("button", { name: "Next change" }).click();
  await page.locator(".view-line", { hasText: ";ql" }).first().waitFor();
  expect(await page.locator(".diff-fan").count()).toBeGreaterThan(1);
}

export async function download(page: Page): Promise<Buffer> {
  await page.getByRole("button", { name: "Download …" }).click();
  const dialog = page.getByRole("dialog");
  const items = dialog.getByRole("checkbox");
  await items.first().waitFor();
  for (const item of await items.all()) await item.check();
  await picture(page, "checklist");
  const waiting = page.waitForEvent("download");
  await dialog.getByRole("button", { name: "I have made sure: download" }).click();
  const file = await waiting;
  await page.getByRole("link", { name: /^Download/ }).waitFor();
  expect(file.suggestedFilename()).toBe("ring-42.seal-ring-stiff-base-and-tough-lip-v2.tuned.gcode");
  return readFileSync(await file.path());
}

/** The same toolpath, as the program on the command line tunes it with the documents that the app gives out. */
export async function commandLine(page: Page, { url, folder }: RunningApp): Promise<Buffer> {
  const reply = await page.request.get(`${url}/api/tunings/${new URL(page.url()).pathname.split("/").at(-1)}`);
  const tuning = await reply.json();
  expect(tuning).toMatchObject({ machineVersion: 1, profileVersion: 2, status: "trial-only", acknowledged: true });
  const [machine, profile] = [join(folder, "machine.json"), join(folder, "profile.json")];
  writeFileSync(machine, await exported(page, `${url}/machines/${tuning.machineId}?version=${tuning.machineVersion}`));
  writeFileSync(profile, await exported(page, `${url}/profiles/${tuning.profileId}?version=${tuning.profileVersion}`));
  const out = join(folder, "tuned.gcode");
  const argv = ["tune", SAMPLE, "--machine", machine, "--profile", profile, "--out", out];
  await run(process.execPath, [join(ROOT, "server/cli/launch.mjs"), ...argv], { cwd: ROOT });
  return readFileSync(out);
}

/** The document of a page, as its button gives it out. */
async function exported(beside: Page, address: string): Promise<Buffer> {
  const page = await beside.context().newPage();
  await page.goto(address);
  const waiting = page.waitForEvent("download");
  await page.getByRole("button", { name: "Save document (JSON)" }).click();
  const bytes = readFileSync(await (await waiting).path());
  await page.close();
  return bytes;
}
