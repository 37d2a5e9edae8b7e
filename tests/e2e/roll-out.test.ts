/** Machines: made in one go from a frozen revision of their type, and later updated one by one. */
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { findAccessibilityProblems, openBrowser, openWindow, signInAs, type Visitor } from "../support/browser";
import { findModelId } from "../support/demo-session";

let app: AppServer;
let browser: Browser;
let tomas: Visitor;
let braider: string;
let hall: string;

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
  // High enough that the register draws every row: it holds only those in sight.
  tomas = await openWindow(browser, app.url, { height: 2400 });
  await signInAs(tomas, "Tomas Lindqvist");
  braider = await findModelId(tomas.page, "Rope braider");
  hall = await findModelId(tomas.page, "Merrow hall");
});

afterAll(async () => {
  await browser?.close();
  await app?.stop();
});

const rowOf = (page: Page, name: RegExp) => page.getByRole("row", { name });
const fileOf = async (page: Page, modelId: string) => (await page.request.get(`/models/${modelId}/nodeset`)).text();
const parkRow = async (page: Page, name: string) => (await page.getByRole("table", { name: /Machines of the park/ }).getByRole("row", { name }).getByRole("cell").allInnerTexts()).map((text) => text.trim());

it("a roll-out makes machines that differ in their members, with NodeIds of a pattern, and leaves the type alone", async () => {
  const { page } = tomas;
  const before = await fileOf(page, braider);
  await page.goto(`/models/${hall}/roll-out`);
  await page.getByText(/is held at revision \d/).waitFor();
  await page.getByLabel("Name of machine 1").fill("B7");
  await page.getByLabel("Serial number of machine 1").fill("MR-0007");
  await page.getByRole("button", { name: "Machine", exact: true }).click();
  await page.getByLabel("Place of machine 2").fill("Bay 8");
  await page.getByRole("checkbox", { name: "Process / PicksCounter" }).check();
  await page.getByRole("button", { name: /^Optional members of machine 2/ }).click();
  const own = page.getByRole("dialog", { name: "Optional members of machine 2" });
  await own.getByRole("checkbox", { name: "Process / PicksCounter" }).uncheck();
  await page.keyboard.press("Escape");
  await page.getByText("Path of names").click();
  await page.getByLabel("NodeId pattern").fill("Hall.{name}");
  await page.getByRole("button", { name: "Preview" }).click();
  await page.getByText("s=Hall.B8").first().waitFor();
  expect(await findAccessibilityProblems(page)).toEqual([]);
  await page.getByRole("button", { name: "Roll out 2 machines" }).click();
  await page.waitForURL(/\/register/);
  await page.getByRole("searchbox", { name: "Filter members" }).fill("B8");
  await rowOf(page, /B8 Object/).waitFor();
  const xml = await fileOf(page, hall);
  expect(xml).toContain('NodeId="ns=1;s=Hall.B7.Process.PicksCounter"');
  expect(xml).not.toContain("Hall.B8.Process.PicksCounter");
  expect(xml).toContain("MR-0007");
  expect(await fileOf(page, braider)).toBe(before);
});

it("a change of the type reaches the machines when it is frozen and taken, machine by machine", async () => {
  const { page } = tomas;
  await page.goto(`/models/${braider}/register`);
  await rowOf(page, /Spindle speed Variable/).getByRole("gridcell", { name: "0 … 180", exact: true }).dblclick();
  await page.keyboard.press("Control+a");
  await page.keyboard.type("0 … 240");
  await page.keyboard.press("Enter");
  await rowOf(page, /Spindle speed Variable/).getByRole("gridcell", { name: "0 … 240" }).waitFor();
  await page.getByText(/^Saved/).first().waitFor();
  await page.goto(`/models/${hall}/roll-out`);
  await page.getByText(/The types have 1 edit since/).waitFor();
  expect(await fileOf(page, hall)).not.toContain("<High>240</High>");

  await page.goto(`/models/${braider}/revisions`);
  await page.getByLabel("Message").first().fill("Faster spindles");
  await page.getByRole("button", { name: "Freeze a revision" }).click();
  await page.getByRole("rowheader", { name: "Faster spindles" }).waitFor();
  await page.goto("/");
  await page.getByText("8 machines follow an earlier type version").waitFor();
  await page.getByRole("link", { name: "See what it brings" }).click();
  await page.getByRole("heading", { name: /What the machines get/ }).waitFor();
  await page.getByRole("table", { name: "Changes of the types" }).getByRole("row", { name: /SpindleSpeed.*range changed.*0 … 180.*0 … 240/ }).waitFor();
  expect(await findAccessibilityProblems(page)).toEqual([]);
  await page.getByRole("checkbox", { name: /^B2/ }).uncheck();
  await page.getByRole("button", { name: /Take revision \d, update 7 machines/ }).click();
  await page.getByText("1 machine follows an earlier one.").waitFor();
  expect((await fileOf(page, hall)).match(/<High>240<\/High>/g)).toHaveLength(7);

  await page.goto("/");
  await page.getByRole("table", { name: /Machines of the park/ }).waitFor();
  const versions = await parkRow(page, "Type version");
  expect(versions.map((text) => /is ready/.test(text))).toEqual([false, true, false, false, false, false, false, false]);
  await page.getByRole("table", { name: /Machines of the park/ }).getByRole("link", { name: /is ready/ }).click();
  await page.getByRole("button", { name: "Update 1 machine" }).click();
  await page.getByText("The types were not changed since.").waitFor();
  expect((await fileOf(page, hall)).match(/<High>240<\/High>/g)).toHaveLength(8);
  expect(tomas.complaints).toEqual([]);
});
