/** The source text: folded by node, in step with the other views, edited as XML and applied as one edit. */
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { findAccessibilityProblems, openBrowser, openWindow, signInAs, type Visitor } from "../support/browser";
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

const source = (page: Page) => page.getByRole("region", { name: "Source text" });
const lineOf = (page: Page, text: string) => source(page).getByText(text).first();

/** Finds the text in the editor and types over it. */
async function replace(page: Page, text: string, by: string): Promise<void> {
  await page.keyboard.press("Control+Home");
  await page.keyboard.press("Control+f");
  await page.getByRole("textbox", { name: "Find", exact: true }).fill(text);
  await page.keyboard.press("Enter");
  await page.keyboard.press("Escape");
  await page.keyboard.type(by);
}

it("is folded by node, tells names, and shares the selection with the register", async () => {
  const { page } = tomas;
  const speed = encodeURIComponent("nsu=http://merrow.example/UA/RopeBraider/;i=6017");
  await page.goto(`/models/${braider}/source?node=${speed}`);
  await lineOf(page, '"1:SpindleSpeed"').waitFor();
  await source(page).getByText("Speed of the main spindle.").waitFor({ state: "detached" });
  await page.getByRole("button", { name: "Unfold" }).click();
  await lineOf(page, "Speed of the main spindle.").waitFor();
  await lineOf(page, "Speed of the main spindle.").click();
  await lineOf(page, '"Float"').hover();
  await page.getByRole("tooltip").getByText("DataType").waitFor();
  await page.mouse.move(10, 10);
  await page.getByRole("link", { name: "Register", exact: true }).click();
  await page.getByRole("row", { name: /Spindle speed Variable/, selected: true }).waitFor();
  await page.getByRole("row", { name: /Humidity Variable/ }).getByText("Humidity", { exact: true }).click();
  await page.getByRole("link", { name: "Source text" }).click();
  await lineOf(page, '"1:Humidity"').waitFor();
});

it("says with its line why an edited text cannot be applied, and applies a good one as one edit", async () => {
  const { page } = tomas;
  await page.goto(`/models/${braider}/source`);
  await page.getByRole("button", { name: "Edit as XML" }).click();
  await replace(page, "Relative humidity of the air", "Moisture of the air <b>");
  await page.getByRole("button", { name: "Check" }).click();
  const answer = page.getByRole("region", { name: "What the check says" });
  await answer.getByRole("alert").getByText("The text cannot be applied.").waitFor();
  await answer.getByRole("button", { name: /^line \d+/ }).first().click();
  await replace(page, "Moisture of the air <b>", "Moisture of the air");
  await page.getByRole("button", { name: "Check" }).click();
  await answer.getByText("Nodes: 0 added, 1 changed, 0 removed.").waitFor();
  expect(await findAccessibilityProblems(page)).toEqual([]);
  // The text in edit is still there after a look at another screen.
  await page.getByRole("link", { name: "Register", exact: true }).click();
  await page.getByRole("row", { name: /Humidity Variable/ }).getByText(/Relative humidity/).waitFor();
  await page.getByRole("link", { name: "Source text" }).click();
  await page.getByRole("button", { name: "Check" }).click();
  await page.getByRole("button", { name: "Apply as one edit" }).click();
  await page.getByText("The text was applied as one edit").waitFor();
  await page.getByRole("link", { name: "Register", exact: true }).click();
  await page.getByRole("row", { name: /Humidity Variable/ }).getByText(/Moisture of the air/).waitFor();
  await page.getByRole("button", { name: /^Undo/ }).click();
  await page.getByRole("row", { name: /Humidity Variable/ }).getByText(/Relative humidity/).waitFor();
  expect(tomas.complaints).toEqual([]);
});
