/** From a machine type to a board with live values in a minute, and the proof that the server is what the model says. */
import type { Browser } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { findAccessibilityProblems, openBrowser, openWindow, signInAs, type Visitor } from "../support/browser";
import { findModelId } from "../support/demo-session";

let app: AppServer;
let browser: Browser;
let tomas: Visitor;
let hall: string;

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
  tomas = await openWindow(browser, app.url);
  await signInAs(tomas, "Tomas Lindqvist");
  hall = await findModelId(tomas.page, "Merrow hall");
});

afterAll(async () => {
  await browser?.close();
  await app?.stop();
});

// The limit is the promise: a minute of clicks.
it("a board of a machine type shows live values", { timeout: 60_000 }, async () => {
  const { page } = tomas;
  await page.goto(`/models/${hall}/test-server`);
  await page.getByRole("button", { name: "Start test server" }).click();
  await page.getByRole("link", { name: "Watch values" }).waitFor({ timeout: 40_000 });
  await page.goto("/boards");
  await page.getByRole("button", { name: /^Make a board of .*Merrow hall/ }).click();
  const figure = page.getByRole("article", { name: "Spindle speed" }).getByRole("paragraph");
  await figure.filter({ hasText: /\d/ }).waitFor();
  const first = await figure.innerText();
  await page.waitForFunction(([text, name]) => document.querySelector(`article[aria-label="${name}"] p`)?.textContent !== text, [first, "Spindle speed"]);
  expect(await findAccessibilityProblems(page)).toEqual([]);
});

it("an as-built report proves the server, with a signal checked by hand", { timeout: 120_000 }, async () => {
  const { page } = tomas;
  await page.goto(`/models/${hall}/as-built`);
  await page.getByRole("combobox", { name: "Signal" }).fill("B1 spindle speed");
  await page.keyboard.press("Enter");
  await page.getByRole("button", { name: "Take the value that it shows" }).click();
  const shown = page.getByLabel("Shown", { exact: true });
  await page.waitForFunction(() => (document.querySelector('input[name="shownValue"]') as HTMLInputElement | null)?.value !== "");
  await page.getByLabel("Stimulus").fill("hand tachometer at the spindle");
  await page.getByLabel("Read beside it").fill(await shown.inputValue());
  await page.getByLabel("Tolerance ±").fill("0.5");
  await page.getByRole("button", { name: "Record the check" }).click();
  await page.getByRole("table", { name: /Point checks/ }).getByText("within").waitFor();
  await page.getByLabel("Compared with").selectOption("working");
  await page.getByLabel("Watch the values for").fill("1");
  await page.getByRole("button", { name: "Make a report" }).click();
  await page.waitForURL(/\/as-built\//, { timeout: 90_000 });
  await page.getByText("Nothing differs").waitFor();
  await page.getByText("1, all within their tolerance").waitFor();
  expect(await findAccessibilityProblems(page)).toEqual([]);
});
