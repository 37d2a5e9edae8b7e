/** The register as a signal list: sorted, filtered, in several languages, searched and replaced, filled from a workbook. */
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { findAccessibilityProblems, openBrowser, openWindow, signInAs, type Visitor } from "../support/browser";
import { findModelId } from "../support/demo-session";

let app: AppServer;
let browser: Browser;
let tomas: Visitor;
let braider: string;

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
  // High enough that the register draws every row: it holds only those in sight.
  tomas = await openWindow(browser, app.url, { height: 2400 });
  await signInAs(tomas, "Tomas Lindqvist");
  braider = await findModelId(tomas.page, "Rope braider");
  await tomas.page.goto(`/models/${braider}/register`);
  await tomas.page.getByRole("treegrid", { name: "Members" }).waitFor();
});

afterAll(async () => {
  await browser?.close();
  await app?.stop();
});

const rowOf = (page: Page, name: RegExp) => page.getByRole("row", { name });
const headOf = (page: Page, name: string) => page.getByRole("columnheader", { name });
const cellOf = (page: Page, row: RegExp, name: string) => rowOf(page, row).getByRole("gridcell", { name, exact: true });

async function membersOf(page: Page, group: string): Promise<string[]> {
  const rows = await page.getByRole("treegrid", { name: "Members" }).getByRole("row").allInnerTexts();
  const names = rows.slice(1).map((row) => row.split("\n")[0] ?? "");
  const from = names.indexOf(group) + 1;
  return names.slice(from, from + 4);
}

/** Puts the cursor into the cell and types over it. */
async function write(page: Page, row: RegExp, column: string, text: string): Promise<void> {
  const index = (await headOf(page, column).getAttribute("aria-colindex")) ?? "";
  await rowOf(page, row).first().locator(`[role=gridcell][aria-colindex="${index}"]`).click();
  await page.keyboard.press("Enter");
  await page.keyboard.press("Control+a");
  await page.keyboard.type(text);
  await page.keyboard.press("Enter");
}

describe("columns and order", () => {
  it("sorts siblings by a press on a head, upwards, downwards and not at all", async () => {
    const { page } = tomas;
    const before = await membersOf(page, "Environment");
    await headOf(page, "Member").getByRole("button").click();
    expect(await headOf(page, "Member").getAttribute("aria-sort")).toBe("ascending");
    await expect.poll(() => membersOf(page, "Environment")).toEqual([...before].sort());
    await headOf(page, "Member").getByRole("button").click();
    await expect.poll(() => membersOf(page, "Environment")).toEqual([...before].sort().reverse());
    await headOf(page, "Member").getByRole("button").click();
    await expect.poll(() => membersOf(page, "Environment")).toEqual(before);
  });

  it("remembers which columns are shown and how wide, and takes another language", async () => {
    const { page } = tomas;
    await page.getByRole("button", { name: /^Columns/ }).click();
    const menu = page.getByRole("dialog", { name: "Columns and order" });
    await menu.getByRole("checkbox", { name: "Rank" }).uncheck();
    await menu.getByRole("spinbutton", { name: "Width of Member in pixels" }).fill("300");
    await menu.getByRole("textbox", { name: "Descriptions in another language" }).fill("de");
    await menu.getByRole("button", { name: "Add column" }).click();
    await page.keyboard.press("Escape");
    await page.reload();
    await headOf(page, "Description de").waitFor();
    expect(await headOf(page, "Rank").count()).toBe(0);
    expect((await headOf(page, "Member").boundingBox())?.width).toBe(300);
  });

  it("filters by words, and for what is not filled in", async () => {
    const { page } = tomas;
    await write(page, /Humidity Variable/, "Description de", "Luftfeuchte an der Maschine");
    await cellOf(page, /Humidity Variable/, "Luftfeuchte an der Maschine").waitFor();
    await page.keyboard.press("/");
    await page.keyboard.type("luftfeuchte");
    await rowOf(page, /Voltage Variable/).waitFor({ state: "detached" });
    expect(await rowOf(page, /Humidity Variable/).count()).toBe(1);
    const filter = page.getByRole("searchbox", { name: "Filter members" });
    await filter.fill("description de:");
    await rowOf(page, /Voltage Variable/).waitFor();
    expect(await rowOf(page, /Humidity Variable/).count()).toBe(0);
    await filter.fill("");
    await rowOf(page, /Humidity Variable/).waitFor();
  });
});

describe("cells", () => {
  it("take a figure with another unit of the same quantity", async () => {
    const { page } = tomas;
    await write(page, /Creel distance Variable/, "EURange", "0 … 45 cm");
    await cellOf(page, /Creel distance Variable/, "0 … 450").waitFor();
  });

  it("are filled down from the first of the selected rows, by one edit", async () => {
    const { page } = tomas;
    await cellOf(page, /Creel distance Variable/, "0 … 450").click();
    await cellOf(page, /Carriage position Variable/, "0 … 250").click({ modifiers: ["Shift"] });
    await page.getByRole("toolbar", { name: "Selected rows" }).getByRole("button", { name: "Fill EURange down" }).click();
    await cellOf(page, /Carriage position Variable/, "0 … 450").waitFor();
    await cellOf(page, /Creel fill Variable/, "0 … 450").waitFor();
    await page.getByRole("treegrid", { name: "Members" }).focus();
    await page.keyboard.press("Control+z");
    await cellOf(page, /Carriage position Variable/, "0 … 250").waitFor();
    await cellOf(page, /Creel fill Variable/, "0 … 100").waitFor();
  });

  it("tell where a member gets its value from", async () => {
    const { page } = tomas;
    await rowOf(page, /Creel distance Variable/).getByRole("gridcell", { name: /creel sensor · Distance/ }).waitFor();
  });
});

describe("finding", () => {
  it("replaces in names and descriptions after a preview, as one edit", async () => {
    const { page } = tomas;
    await page.keyboard.press("Control+k");
    await page.keyboard.type("Find and replace");
    await page.keyboard.press("Enter");
    const panel = page.getByRole("region", { name: "Find and replace" });
    await panel.getByRole("textbox", { name: "Find", exact: true }).fill("Carriage(\\w+)");
    await panel.getByRole("textbox", { name: "Replace with" }).fill("Slide$1");
    await panel.getByRole("checkbox", { name: "Regular expression" }).check();
    await panel.getByRole("cell", { name: "SlidePosition" }).waitFor();
    await panel.getByRole("checkbox", { name: /CarriageDeviation$/ }).first().uncheck();
    expect(await findAccessibilityProblems(page)).toEqual([]);
    await panel.getByRole("button", { name: /^Replace \d/ }).click();
    await panel.waitFor({ state: "detached" });
    await rowOf(page, /Slide position Variable/).waitFor();
    await rowOf(page, /Carriage deviation Variable/).waitFor();
    await page.keyboard.press("Control+z");
    await rowOf(page, /Carriage position Variable/).waitFor();
  });

  it("says why a replacement cannot be made", async () => {
    const { page } = tomas;
    await page.getByRole("treegrid", { name: "Members" }).focus();
    await page.keyboard.press("Control+h");
    const panel = page.getByRole("region", { name: "Find and replace" });
    await panel.getByRole("textbox", { name: "Find", exact: true }).fill("CreelDistance");
    await panel.getByRole("textbox", { name: "Replace with" }).fill("CreelFill");
    await panel.getByRole("alert").waitFor();
    await panel.getByRole("button", { name: "Close find and replace" }).click();
  });

  it("goes to a node by its NodeId and by its unit", async () => {
    const { page } = tomas;
    for (const [query, answer] of [["i=6017", /Spindle speed/], ["hPa", /Ambient pressure/]] as const) {
      await page.keyboard.press("Control+k");
      await page.getByRole("combobox", { name: "Go to node, screen or action" }).fill(query);
      await page.getByRole("option", { name: answer }).first().waitFor();
      await page.keyboard.press("Enter");
      await page.getByRole("row", { name: answer, selected: true }).waitFor();
    }
  });

  it("finds a standard's type with what it brings, and hangs it on as add-in", async () => {
    const { page } = tomas;
    await page.goto(`/models/${braider}/types`);
    await page.getByRole("searchbox", { name: "Search types" }).fill("LockingServicesType");
    await page.getByRole("article", { name: "LockingServicesType" }).getByRole("table", { name: "Members of LockingServicesType" }).waitFor();
    const use = page.getByRole("region", { name: "Use this type" });
    await use.getByText("Use as add-in").click();
    await use.getByLabel("Below").selectOption({ label: "RopeBraiderType" });
    // OPC 10000-100: the add-in of this type is called Lock.
    expect(await use.getByLabel("Name").inputValue()).toBe("Lock");
    await use.getByRole("button", { name: "Add as add-in" }).click();
    await rowOf(page, /Lock Object Lock/).waitFor();
  });
});

describe("signal lists", () => {
  it("go out as a workbook and come in again, columns kept as a template", async () => {
    const { page } = tomas;
    await page.goto(`/models/${braider}/signals`);
    const [download] = await Promise.all([page.waitForEvent("download"), page.getByRole("button", { name: /as signal list \(XLSX\)/ }).click()]);
    expect(download.suggestedFilename()).toBe("rope-braider-signals.xlsx");
    await page.getByLabel("CSV or XLSX file").setInputFiles((await download.path()) ?? "");
    const preview = page.getByRole("table", { name: "Members that the list makes" });
    await preview.getByRole("row", { name: /SpindleSpeed.*r\/min RPM.*0 … 180/ }).waitFor();
    await page.getByRole("region", { name: "Columns" }).getByLabel("Range to").selectOption("none");
    await preview.getByRole("row", { name: /SpindleSpeed.*0 … 180/ }).waitFor({ state: "detached" });
    await page.getByLabel("Keep these columns as template").fill("Without upper end");
    await page.getByRole("button", { name: "Keep", exact: true }).click();
    await page.reload();
    await page.getByLabel("The list").fill("name;unit;low;high;group\noil level;%;0;100;drive/gearbox\nbad;bogus;;;drive");
    await page.getByText("“bogus” is no unit").waitFor();
    await page.getByLabel("Members of").selectOption({ label: "RopeBraiderType" });
    await page.getByRole("button", { name: "Take in 2 signals" }).click();
    await rowOf(page, /oil level Variable/).getByRole("gridcell", { name: "%", exact: true }).waitFor();
    await rowOf(page, /Gearbox Object/).waitFor();
    expect(tomas.complaints).toEqual([]);
  });

  it("are refused with a word when they are no workbook", async () => {
    const { page } = tomas;
    await page.goto(`/models/${braider}/signals`);
    await page.getByLabel("CSV or XLSX file").setInputFiles({ name: "list.xlsx", mimeType: "application/octet-stream", buffer: Buffer.from("not a workbook") });
    await page.getByText("The file is no workbook that can be read").waitFor();
    expect(await findAccessibilityProblems(page)).toEqual([]);
  });
});
