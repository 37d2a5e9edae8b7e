/** Two people on one model: each sees the other's edits, and of two edits to one thing the later is refused and said so. */
import type { Browser } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { openBrowser, openWindow, signInAs, type Visitor } from "../support/browser";
import { findModelId } from "../support/demo-session";

/** Process/RecipeNumber of the demo: the node that both edit. */
const NODE = "nsu=http://merrow.example/UA/RopeBraider/;i=6033";
const SEEN_WITHIN_MS = 2_000;

let app: AppServer;
let browser: Browser;
let tomas: Visitor;
let ines: Visitor;

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
  tomas = await openWindow(browser, app.url);
  ines = await openWindow(browser, app.url);
  await Promise.all([signInAs(tomas, "Tomas Lindqvist"), signInAs(ines, "Ines Okafor")]);
  const modelId = await findModelId(tomas.page, "Rope braider");
  for (const { page } of [tomas, ines]) {
    await page.goto(`/models/${modelId}/register?node=${encodeURIComponent(NODE)}`);
    await describeNode({ page }).waitFor();
  }
});

afterAll(async () => {
  await browser?.close();
  await app?.stop();
});

function describeNode({ page }: Pick<Visitor, "page">) {
  return page.getByRole("region", { name: "Text and access" }).getByRole("textbox", { name: "Description" });
}

async function write(visitor: Visitor, text: string): Promise<void> {
  await describeNode(visitor).fill(text);
  await visitor.page.keyboard.press("Tab");
}

describe("two windows on one model", () => {
  it("see each other's edits within two seconds", async () => {
    await write(tomas, "Recipe that runs now.");
    await expect
      .poll(() => describeNode(ines).inputValue(), { timeout: SEEN_WITHIN_MS, interval: 50 })
      .toBe("Recipe that runs now.");
    await write(ines, "Number of the recipe that runs now.");
    await expect
      .poll(() => describeNode(tomas).inputValue(), { timeout: SEEN_WITHIN_MS, interval: 50 })
      .toBe("Number of the recipe that runs now.");
  });

  it("refuse the later of two edits to one attribute, say so, and lose nothing", async () => {
    await ines.context.setOffline(true);
    await write(ines, "Written by Ines while away.");
    await write(tomas, "Written by Tomas.");
    await tomas.page
      .getByText(/^Saved/)
      .first()
      .waitFor();
    await ines.context.setOffline(false);
    await expect.poll(() => describeNode(ines).inputValue(), { timeout: 15_000 }).toBe("Written by Tomas.");
    const message = ines.page.getByText(/Tomas Lindqvist/).filter({ hasText: /changed|edit|Description/i });
    await message.first().waitFor();
    expect(await describeNode(tomas).inputValue()).toBe("Written by Tomas.");
  });

  it("keep working afterwards", async () => {
    await write(ines, "Number of the recipe.");
    await expect
      .poll(() => describeNode(tomas).inputValue(), { timeout: SEEN_WITHIN_MS, interval: 50 })
      .toBe("Number of the recipe.");
  });

  it("undo one's own edit only", async () => {
    await ines.page.getByRole("button", { name: "Undo" }).click();
    await expect
      .poll(() => describeNode(tomas).inputValue(), { timeout: SEEN_WITHIN_MS, interval: 50 })
      .toBe("Written by Tomas.");
  });
});
