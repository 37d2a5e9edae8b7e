/** A new user models the scenario's braider from the retrofit starter with the mouse: keys only write texts into fields. */
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

/** Clicks into a field and writes. */
async function write(field: Locator, text: string): Promise<void> {
  await field.click();
  await page.keyboard.type(text);
}

async function chooseFromMenu(target: Locator, entry: string): Promise<void> {
  await target.click({ button: "right" });
  await page.getByRole("menuitem", { name: entry, exact: false }).click();
}

async function say(phrase: string): Promise<void> {
  await write(page.getByRole("combobox", { name: /say what it carries/i }), phrase);
  await page.getByRole("option", { name: /^Add / }).click();
  await page.getByRole("option", { name: /^Add / }).waitFor({ state: "detached" });
}

const cardOf = (name: string): Locator => page.getByRole("group", { name: new RegExp(`^\\w+ ${name}$`) });
const headOf = (name: string): Locator => cardOf(name).getByText(name, { exact: true }).first();
const rowsOf = (card: string): Locator =>
  page.getByRole("listbox", { name: `Members of ${card}`, exact: true }).getByRole("option");

describe("the braider by mouse", () => {
  it("begins with the retrofit starter", async () => {
    await page.goto("/sign-in");
    await page
      .getByRole("region", { name: "Demo accounts" })
      .getByRole("button", { name: "Tomas Lindqvist" })
      .click();
    await page.waitForURL((url) => url.pathname !== "/sign-in");
    await page.getByRole("link", { name: "Models", exact: true }).click();
    await page.getByRole("link", { name: "New model" }).first().click();
    await write(page.getByRole("textbox", { name: "Name", exact: true }), "Braider");
    await page.getByText("Retrofit groups").click();
    await page.getByRole("button", { name: "Create model" }).click();
    for (const group of BRAIDER_GROUPS) await rowsOf(group).first().waitFor();
  });

  it("renames the type in its place", async () => {
    await headOf("BraiderType").dblclick();
    const field = page.getByRole("textbox", { name: "New name of BraiderType" });
    await field.waitFor();
    await page.keyboard.type("RopeBraiderType");
    await headOf("Process").click();
    await page.getByRole("listbox", { name: "Members of RopeBraiderType" }).waitFor();
  });

  it.each(BRAIDER_GROUPS)("fills the group %s", async (group) => {
    for (let left = await rowsOf(group).count(); left > 0; left--) {
      await chooseFromMenu(rowsOf(group).first(), "Delete");
      await expect.poll(() => rowsOf(group).count()).toBe(left - 1);
    }
    await headOf(group).click();
    const phrases = listPhrases(group);
    for (const phrase of phrases) await say(phrase);
    expect(await rowsOf(group).count()).toBe(phrases.length);
  });

  it("adds the methods, one of them dragged from the stencil", async () => {
    await headOf("RopeBraiderType").click();
    await say("reset picks() optional");
    await page.getByRole("button", { name: "Add Method" }).dragTo(headOf("RopeBraiderType"));
    const panel = page.getByRole("complementary", { name: "New Method" });
    await write(panel.getByRole("textbox", { name: "Name", exact: true }), "SelectRecipe");
    await addArgument(panel, "Input argument", "RecipeNumber", "UInt16");
    await addArgument(panel, "Output argument", "Accepted", "Boolean");
    await panel.getByText("Optional", { exact: true }).click();
    await panel.getByRole("button", { name: "Add Method" }).click();
    await panel.getByText("SelectRecipe added").waitFor();
    await panel.getByRole("button", { name: "Close" }).click();
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
  await panel.getByRole("button", { name: kind, exact: true }).click();
  await write(panel.getByRole("textbox", { name: `Name of ${kind.toLowerCase()} 1` }), name);
  await write(panel.getByLabel(`DataType of ${kind.toLowerCase()} 1`), dataType);
  await page.getByRole("option", { name: new RegExp(`^${dataType}`) }).first().click();
}
