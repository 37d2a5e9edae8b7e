/**
 * The whole job in one go, as a new user does it: a type with a measured member, its findings mended, the file taken away,
 * a test server started, the value watched as it moves.
 */
import { readFileSync } from "node:fs";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { getValue } from "~/domain/core/result";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { validateXsd } from "~/library/validate-xsd.server";
import { startApp, type AppServer } from "../support/app-server";
import { openBrowser, openWindow, signInAs, type Visitor } from "../support/browser";

const NAMESPACE = "http://merrow.example/UA/Winch/";

let app: AppServer;
let browser: Browser;
let visitor: Visitor;
let page: Page;

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
  visitor = await openWindow(browser, app.url);
  page = visitor.page;
  await signInAs(visitor, "Tomas Lindqvist");
});

afterAll(async () => {
  await browser?.close();
  await app?.stop();
});

function goTo(screen: RegExp): Promise<void> {
  return page.getByRole("navigation", { name: "Screens of Winch" }).getByRole("link", { name: screen }).click();
}

describe("the main job", () => {
  it("offers three next steps after signing in", async () => {
    const steps = page.getByRole("region", { name: "Next steps" }).getByRole("listitem");
    await steps.first().waitFor();
    expect(await steps.count()).toBe(3);
    expect((await steps.allInnerTexts()).join("\n")).toMatch(
      /Open Rope braider[\s\S]*Start a test server[\s\S]*Watch values/,
    );
  });

  it("makes a model", async () => {
    await page.getByRole("link", { name: "New model" }).click();
    await page.getByLabel("Name", { exact: true }).fill("Winch");
    // Proposed from the namespaces that the team has.
    expect(await page.getByLabel("Namespace URI").inputValue()).toBe(NAMESPACE);
    await page.getByRole("button", { name: "Create model" }).click();
    await page.waitForURL(/\/models\/[^/]+\/sheet/);
  });

  it("makes a machine type on the sheet", async () => {
    await page.getByRole("button", { name: "Add ObjectType" }).click();
    const panel = page.getByRole("complementary", { name: "New ObjectType" });
    await panel.getByLabel("Name", { exact: true }).fill("WinchType");
    await panel.getByLabel(/^Description/).fill("A winch on the quay.");
    await panel.getByRole("button", { name: "Add ObjectType" }).click();
    await page.getByRole("application", { name: "Drawing" }).getByText("WinchType").first().waitFor();
  });

  it("adds an analog member in a unit that is found by search", async () => {
    await goTo(/^Register/);
    await page.getByRole("gridcell", { name: "ObjectType WinchType" }).click();
    await page.getByRole("toolbar", { name: "Register tools" }).getByRole("button", { name: "Member" }).click();
    const panel = page.getByRole("complementary", { name: "New Variable" });
    await panel.getByLabel("Name", { exact: true }).fill("OilTemperature");
    await panel.getByLabel(/^Unit/).click();
    await panel.getByRole("combobox", { name: /^Unit/ }).fill("degree cels");
    // UN/CEFACT Rec. 20: degree Celsius is CEL; OPC 10000-8 §5.6.3 gives 4408652 for it.
    await page.getByRole("option", { name: /degree Celsius CEL 4408652/ }).click();
    await panel.getByLabel(/^EURange/).fill("-20 ... 90");
    await panel.getByRole("button", { name: "Add", exact: true }).click();
    const row = page.getByRole("row", { name: /Variable OilTemperature/ });
    await row.waitFor();
    expect(await row.innerText()).toMatch(/AnalogUnitRangeType[\s\S]*Float[\s\S]*°C[\s\S]*−20 … 90[\s\S]*Mandatory/);
    await page.keyboard.press("Escape");
  });

  it("sees a finding and mends it", async () => {
    await goTo(/^Findings/);
    const finding = page.getByRole("listitem").filter({ hasText: "OilTemperature has no Description" });
    await finding.first().waitFor();
    await page.getByRole("link", { name: "Show OilTemperature in the register" }).click();
    await page.getByRole("textbox", { name: "Description" }).fill("Temperature of the oil in the gearbox.");
    await page.keyboard.press("Tab");
    await goTo(/^Findings/);
    await page.getByRole("heading", { name: "Findings", level: 1 }).waitFor();
    await expect.poll(() => finding.count()).toBe(0);
  });

  it("finds everything again after a reload", async () => {
    await page
      .getByText(/^Saved/)
      .first()
      .waitFor();
    await goTo(/^Register/);
    await page.waitForURL(/\/register/);
    await page.reload();
    const row = page.getByRole("row", { name: /Variable OilTemperature/ });
    expect(await row.innerText()).toContain("−20 … 90");
  });

  it("takes away a file that is valid and holds what was made", async () => {
    const [download] = await Promise.all([
      page.waitForEvent("download"),
      page.getByRole("link", { name: "Export" }).click(),
    ]);
    expect(download.suggestedFilename()).toBe("Winch.NodeSet2.xml");
    const bytes = readFileSync(await download.path());
    expect(await validateXsd(bytes)).toEqual([]);
    const { nodes } = getValue(readNodeSet(bytes.toString("utf8")));
    expect(nodes.map((node) => node.browseName.name)).toEqual(
      expect.arrayContaining(["WinchType", "OilTemperature", "EngineeringUnits", "EURange"]),
    );
    expect(bytes.toString("utf8")).toContain("<UnitId>4408652</UnitId>");
  });

  it("starts a test server and says that it simulates", async () => {
    await page.getByRole("link", { name: "Test server", exact: true }).click();
    await page.getByRole("button", { name: "Start test server" }).click();
    await page.getByRole("link", { name: "Watch values" }).waitFor({ timeout: 60_000 });
    const panel = page.getByRole("article");
    expect(await panel.innerText()).toMatch(/Simulated values\. No machine is connected\./);
    expect(await panel.innerText()).toMatch(/opc\.tcp:\/\/127\.0\.0\.1:\d+/);
  });

  it("watches the value change, with unit, status and age", async () => {
    await page.getByRole("link", { name: "Watch values" }).click();
    const open = (column: string, name: RegExp): Promise<void> =>
      page.getByRole("listbox", { name: column }).getByRole("option", { name }).click({ timeout: 30_000 });
    await open("Members of Objects", /Winch/);
    await page.getByRole("option", { name: /OilTemperature/ }).click({ timeout: 30_000 });
    const card = page.getByRole("region", { name: "Value" });
    await card.getByText("°C").first().waitFor();
    await card
      .getByText(/Uncertain_?SimulatedValue/)
      .first()
      .waitFor();
    const first = await card.innerText();
    await expect.poll(() => card.innerText(), { timeout: 10_000, interval: 200 }).not.toBe(first);
    const figures = [first, await card.innerText()].map((text) =>
      Number(/[−-]?\d+[.,]?\d*/.exec(text)?.[0].replace("−", "-")),
    );
    for (const figure of figures) expect(figure).toSatisfy((value: number) => value >= -20 && value <= 90);
  });

  it("met no error in the browser's console", () => {
    expect(visitor.complaints).toEqual([]);
  });
});
