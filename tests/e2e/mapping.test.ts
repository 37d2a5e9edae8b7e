/** The integrator's half of the job by role and label: from a device file to a node with value, unit and status. */
import { readFileSync } from "node:fs";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { openBrowser, openWindow, signInAs, type Visitor } from "../support/browser";
import { findModelId } from "../support/demo-session";

let app: AppServer;
let browser: Browser;
let priya: Visitor;
let braider: string;
let hall: string;

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
  // Tall enough for a field and its Variable: a pointer drags within what is seen.
  priya = await openWindow(browser, app.url, { height: 1_500 });
  await signInAs(priya, "Priya Raman");
  braider = await findModelId(priya.page, "Rope braider");
  hall = await findModelId(priya.page, "Merrow hall");
});

afterAll(async () => {
  await browser?.close();
  await app?.stop();
});

const member = (page: Page, name: string) =>
  page.getByRole("group", { name: "Variables of the type" }).getByRole("button", { name: new RegExp(`^${name},`) });
const field = (page: Page, source: string, name: string) =>
  page
    .getByRole("group", { name: `${source}, process data in` })
    .getByRole("button", { name: new RegExp(`^${name},`) });

async function openMapping(page: Page): Promise<void> {
  await page.goto(`/models/${braider}/mapping`);
  await member(page, "CreelDistance").waitFor();
}

describe("devices", () => {
  it("takes a newer version beside the old one, and refuses a damaged file with its place", async () => {
    const { page } = priya;
    const xml = readFileSync("nodesets/demo/iodd/Quillon-QS-U30-20261102-IODD1.1.xml", "utf8");
    const newer = xml
      .replace('version="V1.00.000" releaseDate="2026-11-02"', 'version="V1.10.000" releaseDate="2027-01-11"')
      .replace('upperValue="4000"', 'upperValue="6000"');
    expect(newer).not.toBe(xml);
    await page.goto("/devices");
    await page.getByLabel(/Drop IODD files here/).setInputFiles([
      { name: "Quillon-QS-U30-20270111-IODD1.1.xml", mimeType: "text/xml", buffer: Buffer.from(newer) },
      { name: "damaged.xml", mimeType: "text/xml", buffer: Buffer.from(xml.slice(0, 3_000)) },
    ]);
    await page.getByRole("region", { name: "damaged.xml" }).getByText("Nothing was stored.").waitFor();
    expect(await page.getByRole("region", { name: "damaged.xml" }).getByRole("table").innerText()).toMatch(/\d+ : \d+/);
    const row = page.getByRole("row", { name: /^QS-U30/ });
    await expect.poll(() => row.getByRole("link", { name: /^V1/ }).allInnerTexts()).toEqual(["V1.10.000", "V1.00.000"]);

    await row.getByRole("link", { name: "QS-U30" }).click();
    await page.getByRole("table", { name: "Differences between the versions" }).getByText("0 … 600").waitFor();
    await page.getByLabel("Try bytes").fill("09 29 FC 01");
    // 0x0929 = 2345, gradient 0.1 in the description: 234.5 mm.
    const distance = page
      .getByRole("group", { name: "QS-U30, process data in" })
      .getByRole("button", { name: /^Distance,/ });
    await expect.poll(() => distance.getAttribute("aria-label")).toContain("value 234.5 mm, Good");
    await page.getByLabel("Try bytes").fill("7F FC FC 00");
    await expect.poll(() => distance.getAttribute("aria-label")).toContain("Bad_SensorFailure");
    await page.getByText("Table", { exact: true }).click();
    await page.getByRole("table", { name: "QS-U30, process data in" }).waitFor();
  });
});

describe("sources", () => {
  it("plans a port, and shows a port that two roles hold as a finding in its place", async () => {
    const { page } = priya;
    await page.goto("/sources");
    const port = (number: number) => page.getByRole("button", { name: new RegExp(`^Port ${number} of M1,`) });
    await port(7).click();
    const plan = page.getByRole("region", { name: "Port 7 of M1" });
    await plan.getByLabel("Device").selectOption({ label: "QS-P12, Inductive position sensor, V1.00.000" });
    await plan.getByLabel("Port class").selectOption("B");
    await plan.getByLabel("Alias in the master").fill("spare");
    await plan.getByRole("button", { name: "Plan port 7" }).click();
    await expect.poll(() => port(7).getAttribute("aria-label")).toContain("IO-Link, autostart, class B");

    await page.goto(`/models/${hall}/mapping`);
    await page.getByRole("button", { name: /^B6 creel sensor:/ }).click();
    const panel = page.getByRole("region", { name: "B6 creel sensor" });
    await panel.getByLabel("Source").selectOption({ label: "M1" });
    await panel.getByLabel("Port").selectOption("1");
    await page.getByText("Saved", { exact: false }).first().waitFor();
    await page.goto("/sources");
    await expect
      .poll(() => port(1).getAttribute("aria-label"), { timeout: 10_000 })
      .toMatch(/B1 creel sensor.*B6 creel sensor/);
    await port(1).click();
    await page.getByRole("region", { name: "Port 1 of M1" }).getByText("R405").waitFor();
  });

  it("binds the roles of all machines by a pattern and says what collides", async () => {
    const { page } = priya;
    await page.goto(`/models/${hall}/mapping`);
    await page.getByLabel("Pattern for creel sensor").fill("M{ceil(n / 2)}:{(n - 1) % 2 * 3 + 1}");
    const cell = (machine: string) => page.getByRole("button", { name: new RegExp(`^${machine} creel sensor:`) });
    // B6 is the second machine of the third master: port 4.
    await expect.poll(() => cell("B6").innerText()).toContain("M3, port 4");
    await page.getByLabel("Pattern for creel sensor").fill("M1:1");
    await expect.poll(() => cell("B2").innerText()).toContain("B1");
    await page.getByLabel("Pattern for creel sensor").fill("M{ceil(n / 2)}:{(n - 1) % 2 * 3 + 1}");
    await page.getByRole("button", { name: /^Bind 1$/ }).click();
    await expect.poll(() => cell("B6").getAttribute("aria-label")).toContain("M3:4");
  });
});

describe("the mapping", () => {
  it("lands a field on a Variable by dragging", async () => {
    const { page } = priya;
    await openMapping(page);
    await member(page, "Humidity").click();
    await page.getByRole("button", { name: "Unmap" }).click();
    await expect.poll(() => member(page, "Humidity").getAttribute("aria-label")).toContain("nothing feeds it");
    await page.getByRole("button", { name: "Close drawer" }).click();
    await field(page, "condition monitor", "Humidity").dragTo(member(page, "Humidity"));
    await expect
      .poll(() => member(page, "Humidity").getAttribute("aria-label"))
      .toContain("fed by condition monitor · Humidity");
  });

  it("lands one by the keyboard alone, converts its unit, and takes it back", async () => {
    const { page } = priya;
    await openMapping(page);
    const open = member(page, "AmbientPressure");
    await open.focus();
    await page.keyboard.press("Enter");
    await page.getByRole("button", { name: "Unmap" }).press("Enter");
    await expect.poll(() => open.getAttribute("aria-label")).toContain("nothing feeds it");
    // Four fields stand before Pressure in the frame; the first one of the ruler has the tab stop.
    await field(page, "condition monitor", "Vibration").focus();
    for (let i = 0; i < 3; i++) await page.keyboard.press("ArrowRight");
    await page.keyboard.press("Enter");
    await page.getByRole("status").filter({ hasText: "Pressure of condition monitor" }).waitFor();
    while (!(await open.evaluate((element) => element === document.activeElement)))
      await page.keyboard.press("ArrowDown");
    await page.keyboard.press("Enter");
    await expect.poll(() => open.getAttribute("aria-label")).toContain("fed by condition monitor · Pressure");
    await page.keyboard.press("Control+z");
    await expect.poll(() => open.getAttribute("aria-label")).toContain("nothing feeds it");
    await page.keyboard.press("Control+Shift+z");
    await expect.poll(() => open.getAttribute("aria-label")).toContain("fed by");
  });

  it("shows the steps of a row and says where a unit does not fit", async () => {
    const { page } = priya;
    await openMapping(page);
    await field(page, "condition monitor", "Vibration").dragTo(member(page, "Humidity"));
    await page.getByRole("region", { name: "Mapping of Environment/Humidity" }).getByText("R200").waitFor();
    await page.keyboard.press("Control+z");
    await expect.poll(() => member(page, "Humidity").getAttribute("aria-label")).toContain("· Humidity");
  });

  it("decodes a pasted frame step by step, and keeps it as a check case that a change breaks", async () => {
    const { page } = priya;
    await openMapping(page);
    await page.getByText("Decode bench").click();
    await page.getByRole("textbox", { name: "creel sensor, process data in" }).fill("09 C4 FC 03");
    // 0x09C4 = 2500 → 250.0 mm → (380 − 250) / (380 − 60) = 40.625 % by the lookup table of the scenario.
    await page.getByRole("button", { name: "Process/CreelFill" }).click();
    const nodes = page.getByRole("table", { name: "Nodes with what the bytes give" });
    for (const text of ["250 mm", "40.625 %"]) await nodes.getByText(text, { exact: true }).first().waitFor();
    await page.getByLabel("Save the bench as").fill("creel at 250 mm");
    await page.getByRole("button", { name: "Save as check case" }).click();
    const saved = page
      .getByRole("list", { name: "Check cases" })
      .getByRole("listitem")
      .filter({ hasText: "creel at 250 mm" });
    await saved.getByText("passes", { exact: true }).waitFor();

    await page.getByText("Wires", { exact: true }).click();
    await member(page, "CreelDistance").click();
    await page.getByRole("button", { name: "Step", exact: true }).click();
    await page.getByRole("menuitem", { name: "Gradient and offset" }).click();
    await page.getByLabel("Offset").fill("5");
    await page.keyboard.press("Enter");
    await page.getByText("Decode bench").click();
    await saved.getByText(/CreelDistance: expected 250 Good, got 255 Good/).waitFor();
    await page.getByRole("button", { name: "Undo" }).click();
    await page.getByRole("button", { name: "Undo" }).click();
    await saved.getByText("passes", { exact: true }).waitFor();
  });

  it("surveys a signal, and complained of nothing all the while", async () => {
    const { page } = priya;
    await page.goto(`/models/${braider}/survey`);
    await page.getByRole("button", { name: "Signal", exact: true }).click();
    const form = page.getByRole("region", { name: "Signal New signal" });
    await form.getByLabel("Name").fill("Bobbin change");
    await page.keyboard.press("Enter");
    await page
      .getByRole("table", { name: "Surveyed signals" })
      .getByRole("button", { name: "Bobbin change" })
      .waitFor();
    // 422 is the damaged file; 409 tells a window that its base is old, which it then follows.
    expect(priya.complaints.filter((text) => !/status of (?:409|422)/.test(text))).toEqual([]);
  });
});
