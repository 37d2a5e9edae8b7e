/** Findings as an engineer settles them: read, mended one by one and all of a kind, accepted, looked up; and their rules. */
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { findAccessibilityProblems, openBrowser, openWindow, signInAs, type Visitor } from "../support/browser";

let app: AppServer;
let browser: Browser;
let tomas: Visitor;
let page: Page;
let modelId: string;

const OWN = "http://merrow.example/UA/Winder/";
const NAMES = ["Tension", "Diameter", "Length"];

/** A type with three Variables without ParentNodeId (R183, error), an instance without them (R086), texts missing (R019). */
function writeFaultyModel(): string {
  const members = NAMES.map(
    (name, i) => `<UAVariable NodeId="ns=1;i=${2001 + i}" BrowseName="1:${name}" DataType="i=11">
  <DisplayName>${name}</DisplayName>
  <References>
    <Reference ReferenceType="i=40">i=63</Reference><Reference ReferenceType="i=37">i=78</Reference>
    <Reference ReferenceType="i=47" IsForward="false">ns=1;i=1001</Reference>
  </References>
</UAVariable>`,
  );
  return `<?xml version="1.0" encoding="utf-8"?>
<UANodeSet xmlns="http://opcfoundation.org/UA/2011/03/UANodeSet.xsd">
  <NamespaceUris><Uri>${OWN}</Uri></NamespaceUris>
  <Models><Model ModelUri="${OWN}" Version="1.0.0" ModelVersion="1.0.0" PublicationDate="2026-01-01T00:00:00Z">
    <RequiredModel ModelUri="http://opcfoundation.org/UA/" PublicationDate="2013-12-02T00:00:00Z"/></Model></Models>
  <UAObjectType NodeId="ns=1;i=1001" BrowseName="1:WinderType"><DisplayName>WinderType</DisplayName>
    <References><Reference ReferenceType="i=45" IsForward="false">i=58</Reference></References></UAObjectType>
  ${members.join("\n")}
  <UAObject NodeId="ns=1;i=3001" BrowseName="1:Winder1"><DisplayName>Winder1</DisplayName><References>
    <Reference ReferenceType="i=40">ns=1;i=1001</Reference><Reference ReferenceType="i=35" IsForward="false">i=85</Reference>
  </References></UAObject>
</UANodeSet>`;
}

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
  tomas = await openWindow(browser, app.url);
  await signInAs(tomas, "Tomas Lindqvist");
  page = tomas.page;
  const made = await page.request.post("/api/v1/models?name=Winder", {
    data: writeFaultyModel(),
    headers: { origin: new URL(page.url()).origin, "content-type": "application/xml" },
  });
  modelId = ((await made.json()) as { id: string }).id;
  await page.goto(`/models/${modelId}/findings`);
  await page.getByRole("heading", { name: "Findings", level: 1 }).waitFor();
});

afterAll(async () => {
  expect(tomas.complaints.filter((text) => /\/(findings|rules)[/:?]/.test(text))).toEqual([]);
  await browser?.close();
  await app?.stop();
});

describe("the page of findings", () => {
  it("shows the facts that collide, the clause, what happens if ignored, and what mending changes", async () => {
    await page.getByRole("searchbox", { name: "Filter findings" }).fill("R183");
    const row = page.getByRole("button", { name: /Tension.*no ParentNodeId/ });
    await row.waitFor();
    if ((await row.getAttribute("aria-expanded")) === "false") await row.press("Enter");
    for (const label of ["Must hold", "If ignored", "Clause"]) await page.getByText(label, { exact: true }).waitFor();
    await page.getByText("ParentNodeId: none").waitFor();
    // OPC 10000-6 Table F.7: ParentNodeId of an InstanceDeclaration.
    await page
      .getByText(/OPC 10000-6 v1\.05\.06 §F\.7/)
      .first()
      .waitFor();
    const preview = page.getByRole("region", { name: "What mending changes" });
    expect(await preview.innerText()).toMatch(/Tension[\s\S]*ParentNodeId[\s\S]*WinderType/);
    expect(await findAccessibilityProblems(page)).toEqual([]);
  });

  it("mends one by keyboard, all of a kind after a preview, and each in one undo step", async () => {
    await page.getByRole("button", { name: "Mend", exact: true }).first().press("Enter");
    await page.getByRole("button", { name: /Tension.*no ParentNodeId/ }).waitFor({ state: "detached" });
    const all = page.getByRole("button", { name: "Mend all 2" });
    await all.press("Enter");
    const preview = page.getByRole("region", { name: /^Mend all/ });
    await preview.getByText("Mends 2 of 2 findings and touches 2 nodes.").waitFor();
    await page.keyboard.press("Escape");
    await preview.waitFor({ state: "detached" });
    await all.press("Enter");
    await preview.getByRole("button", { name: "Mend all 2" }).press("Enter");
    await page.getByText("Nothing matches").waitFor();
    await page.keyboard.press("Control+z");
    await page.getByRole("button", { name: "Mend all 2" }).waitFor();
    await page.keyboard.press("Control+z");
    await page.getByRole("button", { name: "Mend all 3" }).waitFor();
  });

  it("counts as mended what one fix mends along with another", async () => {
    await page.getByRole("searchbox", { name: "Filter findings" }).fill("R086");
    await page.getByRole("button", { name: "Mend all 3" }).press("Enter");
    await page.getByText("Mends 3 of 3 findings and touches 3 nodes.").waitFor();
    await page
      .getByRole("region", { name: /^Mend all/ })
      .getByRole("button", { name: "Mend all 3" })
      .press("Enter");
    await page.getByText("3 findings mended").waitFor();
    await page.getByText("Nothing matches").waitFor();
  });

  it("accepts a finding with a reason until its node changes", async () => {
    await page.getByRole("searchbox", { name: "Filter findings" }).fill("Diameter has no Description");
    const row = page.getByRole("button", { name: /Diameter.*no Description/ }).first();
    await row.waitFor();
    if ((await row.getAttribute("aria-expanded")) === "false") await row.press("Enter");
    await page.getByRole("textbox", { name: "Or accept it, because" }).fill("The name says it all.");
    await page.keyboard.press("Enter");
    const accepted = page.getByRole("table", { name: "Accepted findings" });
    await accepted.getByRole("cell", { name: "The name says it all." }).waitFor();
    await accepted.getByRole("cell", { name: "Tomas Lindqvist" }).waitFor();
    await page.goto(`/models/${modelId}/register?node=${encodeURIComponent(`nsu=${OWN};i=2002`)}`);
    await page.getByRole("textbox", { name: "BrowseName" }).and(page.locator('[value="Diameter"]')).waitFor();
    await page.getByRole("textbox", { name: "BrowseName" }).fill("CoilDiameter");
    await page.keyboard.press("Tab");
    await page.getByRole("link", { name: /^Findings/ }).click();
    await page.getByRole("button", { name: /CoilDiameter.*no Description/ }).waitFor();
    expect(await page.getByRole("table", { name: "Accepted findings" }).count()).toBe(0);
  });

  it("leads to the register, the sheet and the source text", async () => {
    for (const [link, screen] of [
      ["In the register", "register"],
      ["On the sheet", "sheet"],
      ["In the source text", "source"],
    ] as const) {
      await page.goto(`/models/${modelId}/findings`);
      await page.getByRole("searchbox", { name: "Filter findings" }).fill("Length has no Description");
      const row = page.getByRole("button", { name: /Length.*no Description/ }).first();
      await row.waitFor();
      if ((await row.getAttribute("aria-expanded")) === "false") await row.click();
      await page.getByRole("link", { name: link, exact: true }).click();
      await page.waitForURL((url) => url.pathname.endsWith(`/${screen}`) && url.search.includes("2003"));
    }
  });
});

describe("the rules", () => {
  it("are reached from the palette and told with checked examples", async () => {
    await page.keyboard.press("Control+k");
    await page.keyboard.type("Rules of the checker");
    await page.keyboard.press("Enter");
    await page.getByRole("heading", { name: "Rules", level: 1 }).waitFor();
    await page.getByRole("searchbox", { name: "Search the rules" }).fill("R023");
    await page.getByRole("link", { name: "R023" }).press("Enter");
    await page.getByRole("heading", { name: /R023 Target of a reference exists/ }).waitFor();
    expect(await page.getByRole("region", { name: "Bad example as NodeSet2" }).innerText()).toContain(
      "HasTypeDefinition",
    );
    await page.getByText(/names i=4294967290, which does not exist/).waitFor();
    expect(await findAccessibilityProblems(page)).toEqual([]);
  });
});
