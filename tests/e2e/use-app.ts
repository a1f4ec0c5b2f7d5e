import type { Browser } from "playwright-core";
import { afterAll, beforeAll } from "vitest";
import { openBrowser } from "#tests/e2e/browser.ts";
import { type RunningApp, runApp } from "#tests/e2e/running-app.ts";

/** The app and a browser for the stories of one file; both are there once the stories run. */
export function useApp(): { app: RunningApp; browser: Browser } {
  const used = {} as { app: RunningApp; browser: Browser };
  beforeAll(async () => {
    used.app = await runApp();
    used.browser = await openBrowser();
  });
  afterAll(async () => {
    await used.browser?.close();
    await used.app?.close();
  });
  return used;
}
