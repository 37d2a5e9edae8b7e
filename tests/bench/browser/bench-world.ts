/** What all measures share: the application on a free port, one browser, one person who has signed in. */
import type { Browser, Page } from "playwright-core";
import { startApp, type AppServer } from "../../support/app-server";
import { openBrowser, openWindow, signInAs } from "../../support/browser";

export const VIEWPORT = { width: 1440, height: 900 } as const;

export type BenchWorld = {
  readonly page: Page;
  readonly browser: Browser;
  /** Imports a NodeSet2 file; answers the id of the model. */
  importModel(name: string, xml: string): Promise<string>;
  stop(): Promise<void>;
};

export async function openWorld(): Promise<BenchWorld> {
  const app: AppServer = await startApp("demo");
  const browser = await openBrowser();
  const visitor = await openWindow(browser, app.url, VIEWPORT);
  const { page } = visitor;
  page.setDefaultTimeout(60_000);
  await signInAs(visitor, "Tomas Lindqvist");
  return {
    page,
    browser,
    async importModel(name, xml) {
      const answer = await page.request.post(`/api/v1/models?name=${encodeURIComponent(name)}`, {
        data: Buffer.from(xml),
        headers: { "content-type": "application/xml", origin: app.url },
        timeout: 120_000,
      });
      if (answer.status() !== 201) throw new Error(`${name} was not imported: ${await answer.text()}`);
      return ((await answer.json()) as { id: string }).id;
    },
    async stop() {
      await browser.close();
      await app.stop();
    },
  };
}
