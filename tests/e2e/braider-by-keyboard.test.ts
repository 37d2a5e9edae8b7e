/** A new user models the scenario's braider from the retrofit starter without touching the mouse once. */
import type { Browser, Locator, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { BRAIDER_GROUPS, BRAIDER_MEMBERS, listPhrases } from "../support/braider-plan";
import { openBrowser, openWindow, type Visitor } from "../support/browser";
import { readTypeMembers } from "../support/read-braider";

let app: AppServer;
let browser: Browser;
let visitor: Visitor;
let page: Page;

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
  visitor = await openWindow(browser, app.url);
  page = visitor.page;
});

afterAll(async () => {
  await browser?.close();
  await app?.stop();
});

/** Tab, until this has the focus. */
async function tabTo(target: Locator): Promise<void> {
  await target.first().waitFor();
  for (let presses = 0; presses < 80; presses++) {
    if ((await target.and(page.locator(":focus")).count()) > 0) return;
    await page.keyboard.press("Tab");
  }
  throw new Error("The focus did not come there by Tab");
}

async function press(...keys: readonly string[]): Promise<void> {
  for (const key of keys) await page.keyboard.press(key);
}

/** Names a node, a screen or an action in the command palette. */
async function goTo(words: string): Promise<void> {
  const field = page.getByRole("dialog").getByRole("combobox");
  // A page that was just opened hears keys only after its scripts have come; a person presses again.
  for (let tries = 0; tries < 20 && !(await field.isVisible()); tries++) {
    await press("Control+k");
    await field.waitFor({ timeout: 1_000 }).catch(() => undefined);
  }
  await page.keyboard.type(words);
  await page.getByRole("dialog").getByRole("option", { selected: true }).filter({ hasText: words }).waitFor();
  await press("Enter");
  await page.getByRole("dialog").waitFor({ state: "detached" });
}

async function say(phrase: string): Promise<void> {
  await page.keyboard.type(phrase);
  await page.getByRole("option", { name: /^Add / }).waitFor();
  await press("Enter");
  await page.getByRole("option", { name: /^Add / }).waitFor({ state: "detached" });
}

const drawing = (): Locator => page.getByRole("application", { name: "Drawing" });
const rowsOf = (card: string): Locator =>
  page.getByRole("listbox", { name: `Members of ${card}`, exact: true }).getByRole("option");

describe("the braider by keyboard", () => {
  it("begins with the retrofit starter", async () => {
    await page.goto("/sign-in");
    await tabTo(page.getByRole("region", { name: "Demo accounts" }).getByRole("button", { name: "Tomas Lindqvist" }));
    await press("Enter");
    await page.waitForURL((url) => url.pathname !== "/sign-in");
    await goTo("New model");
    const name = page.getByRole("textbox", { name: "Name", exact: true });
    await tabTo(name);
    await page.keyboard.type("Braider");
    await tabTo(page.getByRole("radio", { name: /^Nothing/ }));
    await press("ArrowRight");
    await tabTo(page.getByRole("button", { name: "Create model" }));
    await press("Enter");
    for (const group of BRAIDER_GROUPS) await rowsOf(group).first().waitFor();
  });

  it("renames the type in its place", async () => {
    await goTo("BraiderType");
    await drawing().and(page.locator(":focus")).waitFor();
    await press("F2");
    await page.getByRole("textbox", { name: "New name of BraiderType" }).waitFor();
    await page.keyboard.type("RopeBraiderType");
    await press("Enter");
    await page.getByRole("listbox", { name: "Members of RopeBraiderType" }).waitFor();
  });

  it.each(BRAIDER_GROUPS)("fills the group %s", async (group) => {
    await goTo(group);
    await drawing().and(page.locator(":focus")).waitFor();
    const proposed = await rowsOf(group).count();
    await press("ArrowDown");
    for (let more = 1; more < proposed; more++) await press("Shift+ArrowDown");
    expect(await rowsOf(group).and(page.locator("[aria-selected=true]")).count()).toBe(proposed);
    await press("Delete");
    await rowsOf(group).first().waitFor({ state: "detached" });
    await press("a");
    const phrases = listPhrases(group);
    for (const phrase of phrases) await say(phrase);
    await press("Escape");
    await drawing().and(page.locator(":focus")).waitFor();
    expect(await rowsOf(group).count()).toBe(phrases.length);
  });

  it("adds the methods, one with its arguments", async () => {
    await goTo("RopeBraiderType");
    await drawing().and(page.locator(":focus")).waitFor();
    await press("a");
    await say("reset picks() optional");
    await press("Escape");
    await goTo("Add Method");
    const panel = page.getByRole("complementary", { name: "New Method" });
    await panel.waitFor();
    await page.keyboard.type("SelectRecipe");
    await addArgument(panel, "Input argument", "RecipeNumber", "UInt16");
    await addArgument(panel, "Output argument", "Accepted", "Boolean");
    await tabTo(panel.getByRole("radio", { name: "Mandatory" }));
    await press("ArrowRight");
    await tabTo(panel.getByRole("button", { name: "Add Method" }));
    await press("Enter");
    await panel.getByText("SelectRecipe added").waitFor();
    await press("Escape");
  });

  it("has made what was planned", async () => {
    await page.getByText(/^Saved/).first().waitFor();
    const { pathname } = new URL(page.url());
    const file = await page.request.get(pathname.replace(/\/sheet$/, "/nodeset"));
    const made = readTypeMembers(await file.text(), "RopeBraiderType", "BraiderStateEnum");
    const planned = BRAIDER_MEMBERS.map(({ path, phrase: _, ...facts }) => [path, facts] as const);
    expect(Object.fromEntries(made.members)).toEqual(Object.fromEntries(planned));
    expect(made.methods).toEqual(["ResetPicks", "SelectRecipe"]);
    expect(made.enumeration).toEqual(["0 Off", "1 Setup", "2 Running", "3 Waiting", "4 Fault"]);
    expect(visitor.complaints).toEqual([]);
  });
});

async function addArgument(panel: Locator, kind: string, name: string, dataType: string): Promise<void> {
  await tabTo(panel.getByRole("button", { name: kind, exact: true }));
  await press("Enter");
  await tabTo(panel.getByRole("textbox", { name: `Name of ${kind.toLowerCase()} 1` }));
  await page.keyboard.type(name);
  await press("Tab");
  await page.keyboard.type(dataType);
  await page.getByRole("option", { name: new RegExp(`^${dataType}`) }).first().waitFor();
  await press("Enter");
}
