import { readFileSync } from "node:fs";
import type { Page } from "playwright-core";
import { describe, expect, test } from "vitest";
import { barriers, hasBrowser, openPage, picture, signIn } from "#tests/e2e/browser.ts";
import { pinByKey } from "#tests/e2e/steps.ts";
import { useApp } from "#tests/e2e/use-app.ts";

/** The value beside a label of the pinned layer's predicted numbers. */
const predicted = (page: Page, label: string) =>
  page
    .getByRole("region", { name: "Predicted" })
    .locator("div", { has: page.getByText(label) })
    .last()
    .locator("dd")
    .first();

/** The seal ring about to be tuned, layer 20 pinned. */
async function openSealRing(page: Page, url: string): Promise<void> {
  await signIn(page, url, "engineer");
  await page.getByRole("link", { name: "seal-ring.gcode", exact: true }).click();
  await page.getByRole("link", { name: "Tune", exact: true }).click();
  await page
    .getByRole("combobox", { name: "Profile", exact: true })
    .selectOption({ label: "PEEK: Seal ring, stiff base and tough lip" });
  await pinByKey(page, 20);
}

describe.skipIf(!hasBrowser)("what will happen, in a browser", () => {
  const used = useApp();

  test("a lamp that is turned up makes the predicted layer warmer; levers, table and comparison say the same", async () => {
    const { page, complaints } = await openPage(used.browser);
    await openSealRing(page, used.app.url);

    await page.getByRole("tab", { name: "Layer 20" }).click();
    const interlayer = predicted(page, "Interlayer temperature");
    await interlayer.waitFor();
    const before = await interlayer.textContent();
    await page.getByText("its own cooling").waitFor();
    await picture(page, "prediction");
    expect(await barriers(page)).toEqual([]);

    await page.getByRole("tab", { name: "Profile" }).click();
    await page.getByRole("button", { name: /^Zone base/ }).click();
    await page.getByRole("group", { name: "lamp in zone base" }).getByLabel("Duty").fill("0.72");
    await page.getByRole("tab", { name: "Layer 20" }).click();
    await expect.poll(() => interlayer.textContent()).not.toBe(before);
    expect(degrees(await interlayer.textContent())).toBeGreaterThan(degrees(before));

    await page.getByRole("tab", { name: "Levers" }).click();
    await page.getByRole("img", { name: /^Interlayer temperature over the duties/ }).waitFor();
    await picture(page, "levers");
    expect(await barriers(page)).toEqual([]);

    const waiting = page.waitForEvent("download");
    await page.getByRole("button", { name: "Plan as CSV" }).click();
    const rows = readFileSync(await (await waiting).path(), "utf8")
      .trim()
      .split("\r\n");
    expect(rows).toHaveLength(1 + 45);
    const column = rows[0].split(",").indexOf("lamp duty");
    expect(Number(rows[20].split(",")[column])).toBeCloseTo(0.72, 2);
    expect(rows[0]).toContain("interlayerC low");

    await page.getByRole("link", { name: "Compare with another profile" }).click();
    await page.getByRole("heading", { name: "After" }).waitFor();
    await page
      .getByRole("combobox", { name: "Profile", exact: true })
      .last()
      .selectOption({ label: "PEEK: Mast bracket, stiff throughout" });
    await page.getByRole("region", { name: "Differences" }).getByRole("row").nth(1).waitFor();
    await picture(page, "compare");
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test("a zone that is held gets its duties from the prediction, and its tuned file is written", async () => {
    const { page, complaints } = await openPage(used.browser);
    await openSealRing(page, used.app.url);
    await page.getByRole("button", { name: /^Zone base/ }).click();
    await page.getByRole("group", { name: "lamp in zone base" }).getByLabel("Rule").selectOption("hold");
    await page.getByRole("tab", { name: "Layer 20" }).click();
    await expect
      .poll(() => page.getByRole("list", { name: "Reasons for lamp" }).textContent(), { timeout: 20_000 })
      .toMatch(/held semi-crystalline/);
    await page.getByRole("button", { name: "Write tuned file" }).click();
    await page.getByLabel("Why").fill("The base is held");
    await page.getByRole("dialog").getByRole("button", { name: "Write tuned file" }).click();
    await page.getByText(/The proof holds: \d+ of \d+/).waitFor();
    await pinByKey(page, 20);
    await page.getByRole("region", { name: "Predicted" }).waitFor();
    expect(complaints).toEqual([]);
    await page.context().close();
  });
});

const degrees = (text: string | null): number => Number(/(\d+)\s*$/.exec(text ?? "")?.[1]);
