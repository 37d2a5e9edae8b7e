/** Modelling as an engineer does it: with the keyboard alone on the sheet, like a spreadsheet in the register, by dragging. */
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { openBrowser, openWindow, signInAs, type Visitor } from "../support/browser";
import { findModelId } from "../support/demo-session";

let app: AppServer;
let browser: Browser;
let tomas: Visitor;
let braider: string;

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
  tomas = await openWindow(browser, app.url);
  await signInAs(tomas, "Tomas Lindqvist");
  braider = await findModelId(tomas.page, "Rope braider");
});

afterAll(async () => {
  await browser?.close();
  await app?.stop();
});

const membersOf = (page: Page, card: string) =>
  page.getByRole("listbox", { name: `Members of ${card}` }).getByRole("option");
const rowOf = (page: Page, name: RegExp) => page.getByRole("row", { name });

async function say(page: Page, phrase: string): Promise<void> {
  await page.keyboard.type(phrase);
  await page.getByRole("option", { name: /^Add / }).waitFor();
  await page.keyboard.press("Enter");
  await page.getByRole("option", { name: /^Add / }).waitFor({ state: "detached" });
}

describe("the sheet", () => {
  it("is modelled on without touching the mouse", async () => {
    const { page } = tomas;
    await page.goto(`/models/${braider}/sheet`);
    await membersOf(page, "Process").first().waitFor();
    await page.getByRole("application", { name: "Drawing" }).focus();
    await page.keyboard.press("Control+k");
    await page.keyboard.type("Add ObjectType");
    await page.keyboard.press("Enter");
    await page.getByRole("complementary", { name: "New ObjectType" }).waitFor();
    await page.keyboard.type("WinderType");
    await page.keyboard.press("Enter");
    await page.getByRole("textbox", { name: "BrowseName" }).and(page.locator('[value="WinderType"]')).waitFor();
    await page.getByRole("application", { name: "Drawing" }).focus();
    await page.keyboard.press("a");
    await say(page, "rope tension N 0..2000");
    await say(page, "bobbin counter");
    await say(page, "reset()");
    await expect
      .poll(async () => (await membersOf(page, "WinderType").allInnerTexts()).map((text) => text.split("\n")[0]))
      .toEqual(["RopeTension", "BobbinCounter", "Reset"]);
    const tension = membersOf(page, "WinderType").first();
    expect(await tension.getAttribute("aria-label")).toMatch(/^RopeTension, Variable, Float in N, cardinality 1/);
  });

  it("takes edits back and does them again", async () => {
    const { page } = tomas;
    await page.getByRole("application", { name: "Drawing" }).focus();
    const counter = membersOf(page, "WinderType").filter({ hasText: "BobbinCounter" });
    for (let i = 0; i < 2; i++) await page.keyboard.press("Control+z");
    await counter.waitFor({ state: "detached" });
    await page.keyboard.press("Control+Shift+z");
    await counter.waitFor();
  });

  it("offers only lawful references between two nodes, the usual one first", async () => {
    const { page } = tomas;
    await membersOf(page, "WinderType").filter({ hasText: "RopeTension" }).click();
    await page.keyboard.press("c");
    await page.getByRole("combobox", { name: "Target of the reference" }).fill("BraiderStateEnum");
    await page.keyboard.press("Enter");
    const offers = page.getByRole("listbox", { name: "Reference types" });
    await offers.waitFor();
    const names = await offers.getByRole("option").allInnerTexts();
    // A DataType is no component and no Property of a Variable (OPC 10000-3 §7.7, §7.8).
    expect(names[0]).toMatch(/^DataType/);
    expect(names.join("\n")).not.toMatch(/HasComponent|HasProperty|HasSubtype/);
    await page.keyboard.press("Escape");
  });
});

describe("the register", () => {
  it("is filled like a spreadsheet", async () => {
    const { page } = tomas;
    await page.goto(`/models/${braider}/register`);
    const power = rowOf(page, /Active power Variable/);
    await power.getByRole("gridcell", { name: "kW", exact: true }).click();
    await page.keyboard.type("watt");
    await page.getByRole("option", { name: /\bwatt WTT\b/ }).first().click();
    // UN/CEFACT Recommendation 20: watt is WTT; its id is the code's characters as a number (OPC 10000-8 §5.6.3.4).
    await power.getByRole("gridcell", { name: "W", exact: true }).waitFor();
    await power.getByRole("gridcell", { name: "0 … 15", exact: true }).click();
    await page.keyboard.press("Enter");
    await page.getByRole("textbox", { name: "EURange of ActivePower" }).fill("0 … 15000");
    await page.keyboard.press("Enter");
    await power.getByRole("gridcell", { name: "0 … 15000" }).waitFor();
  });

  it("takes a block from a spreadsheet as one edit", async () => {
    const { page } = tomas;
    await rowOf(page, /Voltage Variable/)
      .getByRole("gridcell", { name: "V", exact: true })
      .click();
    await page.getByRole("treegrid", { name: "Members" }).evaluate((grid) => {
      const clipboardData = new DataTransfer();
      clipboardData.setData("text/plain", "mV\t0 … 250000\nmA\t0 … 63000");
      grid.dispatchEvent(new ClipboardEvent("paste", { clipboardData, bubbles: true, cancelable: true }));
    });
    await rowOf(page, /Voltage Variable/)
      .getByRole("gridcell", { name: "0 … 250000" })
      .waitFor();
    await rowOf(page, /Current Variable/)
      .getByRole("gridcell", { name: "mA", exact: true })
      .waitFor();
    await page.keyboard.press("Control+z");
    await rowOf(page, /Voltage Variable/)
      .getByRole("gridcell", { name: "V", exact: true })
      .waitFor();
    await rowOf(page, /Current Variable/)
      .getByRole("gridcell", { name: "0 … 63", exact: true })
      .waitFor();
  });

  it("keeps everything over a reload", async () => {
    const { page } = tomas;
    await page
      .getByText(/^Saved/)
      .first()
      .waitFor();
    await page.reload();
    await rowOf(page, /Active power Variable/)
      .getByRole("gridcell", { name: "0 … 15000" })
      .waitFor();
    expect(tomas.complaints).toEqual([]);
  });
});
