import { existsSync, readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { join } from "node:path";
import { type Browser, chromium, type Page } from "playwright-core";
import { PASSWORD } from "#tests/e2e/running-app.ts";

const CHROMIUM = process.env.CHROMIUM ?? "/usr/bin/chromium";
const PICTURES = join(import.meta.dirname, "pictures");
const axe = readFileSync(createRequire(import.meta.url).resolve("axe-core/axe.min.js"), "utf8");

/** These tests need a browser; where there is none they are left out and say so. */
export const hasBrowser = existsSync(CHROMIUM);

export function openBrowser(): Promise<Browser> {
  return chromium.launch({ executablePath: CHROMIUM, args: ["--no-sandbox", "--disable-background-networking"] });
}

/** A page that remembers what it complained of. */
export async function openPage(browser: Browser): Promise<{ page: Page; complaints: string[] }> {
  const context = await browser.newContext({ viewport: { width: 1440, height: 950 }, acceptDownloads: true });
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on("pageerror", (error) => complaints.push(error.message));
  page.on("console", (message) => {
    // Asking who is signed in is answered with 401 when nobody is, and the browser makes a note of that.
    const expected = message.location().url.endsWith("/api/session");
    if (["error", "warning"].includes(message.type()) && !expected) complaints.push(`${page.url()}: ${message.text()}`);
  });
  return { page, complaints };
}

export async function signIn(page: Page, url: string, role: string): Promise<void> {
  await page.goto(`${url}/sign-in`);
  await page.getByLabel("E-mail").fill(`${role}@alderbay.example`);
  await page.getByLabel("Password").fill(PASSWORD);
  await page.getByRole("button", { name: "Sign in" }).click();
  await page.getByRole("heading", { name: "Floor" }).waitFor();
}

export async function picture(page: Page, name: string): Promise<void> {
  await page.screenshot({ path: join(PICTURES, `${name}.png`) });
}

/** What hinders people on this page, as far as a program can tell: WCAG 2.2 AA and below. */
export async function barriers(page: Page): Promise<string[]> {
  // Through the debugger's door: the page's content policy rightly lets no such script in.
  await page.evaluate(axe);
  return page.evaluate(async () => {
    const tags = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"];
    const { violations } = await (window as unknown as { axe: AxeLike }).axe.run({
      runOnly: { type: "tag", values: tags },
    });
    return violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(" ")).join(" | ")}`);
  });
}

interface AxeLike {
  run(options: object): Promise<{ violations: { id: string; nodes: { target: string[] }[] }[] }>;
}
