/** Sheets as people keep them: several a model, what they show, pictures of them, and two people on one of them. */
import { readFileSync } from "node:fs";
import type { Browser, Locator, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { findAccessibilityProblems, openBrowser, openWindow, signInAs, type Visitor } from "../support/browser";
import { findModelId } from "../support/demo-session";

let app: AppServer;
let browser: Browser;
let tomas: Visitor;
let ines: Visitor;
let page: Page;
let braider: string;

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
  tomas = await openWindow(browser, app.url);
  ines = await openWindow(browser, app.url, { theme: "dark" });
  await Promise.all([signInAs(tomas, "Tomas Lindqvist"), signInAs(ines, "Ines Okafor")]);
  page = tomas.page;
  // The dialog of a browser without a screen never closes; its own way to a PDF prints the same.
  await page.addInitScript(() => {
    window.print = () => undefined;
  });
  braider = await findModelId(page, "Rope braider");
  await page.goto(`/models/${braider}/sheet`);
  await rowsOf(page, "Process").first().waitFor();
});

afterAll(async () => {
  await browser?.close();
  await app?.stop();
});

const rowsOf = (at: Page, card: string): Locator =>
  at.getByRole("listbox", { name: `Members of ${card}`, exact: true }).getByRole("option");
const cardOf = (at: Page, name: RegExp): Locator => at.getByRole("group", { name });
const tabs = (at: Page): Locator => at.getByRole("navigation", { name: "Sheets of Rope braider" }).getByRole("button");

async function choose(menu: string, entry: string): Promise<void> {
  await page.getByRole("button", { name: menu }).click();
  await page.getByRole("menuitem", { name: entry }).click();
}

describe("the sheets of a model", () => {
  it("are made from a selection, renamed, moved and deleted", async () => {
    await rowsOf(page, "Process").filter({ hasText: "Spindle speed" }).click();
    await choose("New sheet", "From the selection");
    await tabs(page).filter({ hasText: "Spindle speed" }).waitFor();
    await cardOf(page, /^Variable Spindle speed/).waitFor();
    expect(await cardOf(page, /^(Object|Variable|Method|DataType)/).count()).toBe(1);
    await choose("This sheet", "Rename");
    await page.getByRole("textbox", { name: /^New name of sheet/ }).fill("Spindle");
    await page.keyboard.press("Enter");
    await choose("This sheet", "Move left");
    await expect.poll(() => tabs(page).allInnerTexts()).toEqual(["Spindle", "Overview"]);
    await choose("This sheet", "Delete the sheet");
    await expect.poll(() => tabs(page).allInnerTexts()).toEqual(["Overview"]);
    await page.getByRole("button", { name: "Bring it back" }).click();
    await cardOf(page, /^Variable Spindle speed/).waitFor();
    await expect.poll(() => tabs(page).allInnerTexts()).toEqual(["Overview", "Spindle"]);
  });

  it("show what lies around a node, and one node alone", async () => {
    await cardOf(page, /^Variable Spindle speed/).getByText("Spindle speed").first().click();
    await page.keyboard.press("n");
    await rowsOf(page, "Process").first().waitFor();
    await page.keyboard.press("o");
    await page.getByRole("group", { name: "Focus" }).getByText("Focus on").waitFor();
    await page.getByRole("button", { name: "Back to Spindle" }).click();
    await tabs(page).filter({ hasText: "Overview" }).click();
    await rowsOf(page, "Energy").first().waitFor();
  });

  it("keep a card where a hand put it while the others are arranged", async () => {
    const card = cardOf(page, /^DataType BraiderStateEnum/);
    await card.click();
    for (let presses = 0; presses < 12; presses++) await page.keyboard.press("Alt+ArrowDown");
    const layoutOf = async () => {
      const [sheet] = (await (await page.request.get(`/models/${braider}/sheets`)).json()) as { id: string }[];
      return (await (await page.request.get(`/models/${braider}/sheets/${sheet?.id ?? ""}`)).json()) as {
        positions: Record<string, { x: number; y: number }>;
        byHand: string[];
      };
    };
    await expect.poll(async () => (await layoutOf()).byHand?.length ?? 0).toBe(1);
    const before = await layoutOf();
    const [key = ""] = before.byHand;
    await page.getByRole("button", { name: "Arrange the cards" }).click();
    await expect.poll(async () => JSON.stringify((await layoutOf()).positions) !== JSON.stringify(before.positions), { timeout: 15_000 }).toBe(true);
    expect((await layoutOf()).positions[key]).toEqual(before.positions[key]);
  });

  it("are saved as a picture and printed with the title block", async () => {
    const download = page.waitForEvent("download");
    await choose("This sheet", "Save as SVG");
    const svg = readFileSync((await (await download).path()) ?? "", "utf8");
    expect(svg).toMatch(/^<\?xml/);
    for (const text of ["RopeBraiderType", "Spindle speed", "http://merrow.example/UA/RopeBraider/", "Overview, 1 of 2"]) expect(svg).toContain(text);
    const picture = page.waitForEvent("download");
    await choose("This sheet", "Save as PNG");
    const png = readFileSync((await (await picture).path()) ?? "");
    expect(png.subarray(1, 4).toString()).toBe("PNG");
    await choose("This sheet", "Print, or save as PDF");
    const pdf = await page.pdf({ preferCSSPageSize: true });
    // One page of A3 landscape, 420 × 297 mm (ISO 216) in points.
    const boxes = [...pdf.toString("latin1").matchAll(/MediaBox \[0 0 ([\d.]+) ([\d.]+)\]/g)].map(([, width, height]) => [Math.round(Number(width)), Math.round(Number(height))]);
    expect(boxes).toEqual([[1191, 842]]);
  });

  it("can be read by everybody", async () => {
    expect(await findAccessibilityProblems(page)).toEqual([]);
  });
});

describe("two people", () => {
  it("see where the other is and what the other has selected", async () => {
    await ines.page.goto(`/models/${braider}/sheet`);
    await rowsOf(ines.page, "Process").first().waitFor();
    await rowsOf(ines.page, "Energy").first().click();
    await page.getByRole("group", { name: "Also here" }).getByTitle("Ines Okafor on the sheet Overview").waitFor();
    await rowsOf(page, "Energy").first().getByText("Ines", { exact: true }).waitFor();
  });

  it("get the required models that the other chose, without a hand", async () => {
    await page.goto(`/models/${braider}/about`);
    const found = page.getByRole("listbox", { name: "Add a required model" }).getByRole("option");
    // What is typed before the page has come to life is lost: type until it answers.
    const type = async (): Promise<number> => {
      await page.getByRole("combobox", { name: "Add a required model" }).fill("");
      await page.getByRole("combobox", { name: "Add a required model" }).fill("PackML");
      return found.count();
    };
    await expect.poll(type, { timeout: 15_000, interval: 500 }).toBeGreaterThan(0);
    await found.first().click();
    await page.getByRole("button", { name: "Save required models" }).click();
    await ines.page.getByText(/changed what this model stands on/).first().waitFor();
    await rowsOf(ines.page, "Process").first().waitFor();
    expect(ines.complaints).toEqual([]);
  });

  it("are no longer told anything after signing out", async () => {
    await ines.page.getByRole("button", { name: /^Ines Okafor: theme and sign-out/ }).click();
    await ines.page.getByRole("button", { name: "Sign out" }).or(ines.page.getByRole("menuitem", { name: "Sign out" })).click();
    await ines.page.waitForURL("**/sign-in");
    expect((await ines.page.request.get("/events")).status()).toBe(401);
  });
});
