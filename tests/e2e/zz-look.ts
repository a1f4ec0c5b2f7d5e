import { writeFileSync } from "node:fs";
import { hasBrowser, openBrowser, openPage, signIn, barriers } from "#tests/e2e/browser.ts";
import { runApp } from "#tests/e2e/running-app.ts";
import { everyPage } from "#tests/e2e/every-page.ts";
const only = process.argv.slice(2);
const app = await runApp();
const browser = await openBrowser();
const out: string[] = [];
try {
  const { page, complaints } = await openPage(browser);
  await page.goto(`${app.url}/sign-in`);
  await page.screenshot({ path: "/tmp/w/pa/sign-in.png" });
  await signIn(page, app.url, "lead");
  let list = await everyPage(page, app.url);
  const profiles = await (await page.request.get(`${app.url}/api/profiles`)).json();
  const p = profiles.find((x: any) => x.name.startsWith("Seal ring, stiff"));
  const { document } = await (await page.request.get(`${app.url}/api/profiles/${p.id}/versions/1`)).json();
  const d2 = structuredClone(document);
  d2.zones[0].name = d2.zones[0].name; d2.withinLayer = "keep-raises"; d2.limits = { ...d2.limits, lamp: { ...d2.limits.lamp, maxDuty: 0.65 } };
  d2.zones[0].to = 6.25; d2.zones[1].from = 6.25;
  const r0 = d2.zones[0].cooling[0]; if (r0.points) r0.points = r0.points.map(([x, y]: number[]) => [x, Math.min(1, y + 0.05)]); else r0.duty = 0.3;
  await page.request.post(`${app.url}/api/profiles/${p.id}/versions`, { data: { basedOn: 1, document: d2, note: "More cooling for the base, a slower lamp" }, headers: { origin: app.url } }).then(async (r: any) => { if (!r.ok()) out.push("POST " + r.status() + " " + (await r.text())); });
  list.push(`/profiles/${p.id}/compare?from=1&to=2`);
  list = [...new Set(list)].filter((x) => !/tune|tunings\/|\/profiles\/.*(edit|new)/.test(x));
  if (only.length) list = list.filter((x) => only.some((o) => new RegExp(o).test(x)));
  let n = 0;
  for (const path of list) {
    const name = path.replace(/[0-9a-f-]{36}/g, "id").replace(/[^a-z0-9]+/gi, "_") || "floor";
    for (const [w, h] of [[1440, 900], [820, 1180]] as const) {
      for (const colorScheme of ["light", "dark"] as const) {
        await page.setViewportSize({ width: w, height: h });
        await page.emulateMedia({ colorScheme });
        await page.goto(app.url + path);
        await page.getByRole("heading", { level: 1 }).waitFor();
        await page.waitForTimeout(500);
        await page.screenshot({ path: `/tmp/w/pa/${String(n).padStart(2, "0")}${name}-${w}-${colorScheme}.png`, fullPage: true });
        const b = await barriers(page);
        if (b.length) out.push(`${path} ${w} ${colorScheme}: ${b.join(" ; ")}`);
        const over = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
        if (over > 0) out.push(`${path} ${w}: ${over}px too wide`);
        const head = await page.evaluate(() => document.querySelector("header")?.getBoundingClientRect().height);
        if (n === 0) out.push(`header ${w}: ${head}`);
      }
    }
    n++;
  }
  out.push(...complaints);
} finally {
  await browser.close();
  await app.close();
}
writeFileSync("/tmp/w/pa/out.txt", out.join("\n"));
console.log(out.join("\n"));
process.exit(0);
