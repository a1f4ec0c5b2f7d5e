import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { parseProfile, writeProfile } from "#shared/formats/profile.ts";
import { hasBrowser, openPage, picture, signIn } from "#tests/e2e/browser.ts";
import { everyPage, inBothSheets } from "#tests/e2e/every-page.ts";
import { commandLine, download, dropFile, findChange, movePoint, pinByKey, SAMPLE, sample } from "#tests/e2e/steps.ts";
import { useApp } from "#tests/e2e/use-app.ts";

describe.skipIf(!hasBrowser)("the whole job in a browser", () => {
  const used = useApp();

  test("a toolpath is dropped, a curve point moved, the tuned file written, looked at and downloaded: the command line's bytes", async () => {
    const { page, complaints } = await openPage(used.browser);
    await signIn(page, used.app.url, "engineer");
    await picture(page, "floor");

    await page.getByLabel("Machine").selectOption({ label: "Tern" });
    await dropFile(page, "ring-42.gcode", readFileSync(SAMPLE));
    await page.getByRole("link", { name: "Tune", exact: true }).waitFor();
    await pinByKey(page, 12);
    await picture(page, "toolpath");

    await page.getByRole("link", { name: "Tune", exact: true }).click();
    await page
      .getByLabel("Profile", { exact: true })
      .selectOption({ label: "PEEK: Seal ring, stiff base and tough lip" });
    await pinByKey(page, 12);
    await movePoint(page);
    await picture(page, "tune");

    await page.getByRole("button", { name: "Write tuned file" }).click();
    await page.getByLabel("Why").fill("More cooling for the base");
    await page.getByRole("dialog").getByRole("button", { name: "Write tuned file" }).click();
    await page.getByText(/The proof holds: \d+ of \d+/).waitFor();
    await picture(page, "tuning");

    await findChange(page);
    await picture(page, "diff");

    const tuned = await download(page);
    const expected = await commandLine(page, used.app);
    expect(tuned.equals(expected)).toBe(true);
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test("documents live in versions: approved, compared, restored as a new one, saved as files and brought in", async () => {
    const { page, complaints } = await openPage(used.browser);
    await signIn(page, used.app.url, "lead");
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
    // A head, the part of the document, and what differs in it.
    expect(await table.getByRole("row").allTextContents()).toEqual([
      "PlaceVersion 1Version 2Unit",
      "The whole profile",
      "Name−Valve plate, flat and stiff+Valve plate, flat, stiff and renamed",
    ]);
    await page.getByRole("button", { name: "Approve version 2" }).waitFor();
    await page.getByRole("link", { name: "To the profile" }).click();
    await page.getByRole("button", { name: "Restore as 3" }).click();
    await page.getByRole("dialog").getByRole("button", { name: "Restore as version 3" }).click();
    await page.getByRole("heading", { name: "Valve plate, flat and stiff" }).waitFor();

    const waiting = page.waitForEvent("download");
    await page.getByRole("button", { name: "Save document (JSON)" }).click();
    const exported = readFileSync(await (await waiting).path(), "utf8");
    const given = parseProfile(sample("profiles/valve-plate-flat-and-stiff.json"));
    expect(exported).toBe(writeProfile({ ...given, version: 3 }));

    await page.getByRole("link", { name: "Profiles", exact: true }).click();
    const input = page.getByLabel("JSON file of a profile");
    const file = (text: string) => ({ name: "p.json", mimeType: "application/json", buffer: Buffer.from(text) });
    await input.setInputFiles(file(exported.replace("0.", "7.")));
    await page
      .getByRole("dialog", { name: "Not brought in" })
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
    const { page, complaints } = await openPage(used.browser);
    await signIn(page, used.app.url, "operator");
    await page.getByRole("link", { name: "valve-plate.gcode", exact: true }).click();
    await page.getByRole("button", { name: "Read for another machine" }).click();
    await page.getByRole("dialog").getByLabel("Machine").selectOption({ label: "Fulmar" });
    await page.getByRole("dialog").getByRole("button", { name: "Read" }).click();
    await page.getByLabel("Read for", { exact: true }).waitFor();
    await page.getByText("Print time", { exact: true }).first().waitFor();
    const shown = page.getByLabel("Read for", { exact: true }).locator("option:checked");
    expect(await shown.textContent()).toBe("Fulmar, version 1");
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test("no page puts up barriers, on the light sheet or the dark one, nor is wider than a tablet", async () => {
    const { page, complaints } = await openPage(used.browser);
    await page.goto(`${used.app.url}/sign-in`);
    const found: Record<string, string[]> = { "sign-in": await inBothSheets(page) };
    await signIn(page, used.app.url, "lead");
    for (const path of await everyPage(page, used.app.url)) {
      await page.goto(used.app.url + path);
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
