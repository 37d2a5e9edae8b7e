/** Taking a NodeSet2 file in: the preview says what would come of it, and a file that is refused leaves nothing behind. */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { openBrowser, openWindow, signInAs, type Visitor } from "../support/browser";
import { projectRoot } from "../support/source-files";

const winch = readFileSync(join(projectRoot, "tests/fixtures/test-server/winch.NodeSet2.xml"), "utf8");

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

async function choose(name: string, content: string | Buffer): Promise<void> {
  await page.goto("/models/import");
  await page
    .getByLabel("Drop a NodeSet2 file here")
    .setInputFiles({ name, mimeType: "text/xml", buffer: Buffer.from(content) });
}

async function listModels(): Promise<string[]> {
  await page.goto("/models");
  const rows = page.getByRole("table", { name: "Models of the team" }).getByRole("row");
  await rows.first().waitFor();
  return (await rows.allInnerTexts()).slice(1).map((row) => row.split("\n")[0] ?? "");
}

describe("import", () => {
  it("shows models, required models, counts and problems before anything is stored", async () => {
    const before = await listModels();
    expect(before).toEqual(["Merrow hall", "Rope braider"]);
    await choose("winch.xml", winch);
    await page.getByRole("heading", { name: "winch.xml" }).waitFor();
    const cells = await page.getByRole("table", { name: "Models in the file" }).getByRole("cell").allInnerTexts();
    expect(cells[0]).toBe("http://merrow.example/UA/Winch/");
    const required = page.getByRole("table", { name: "Required models" });
    expect(await required.getByRole("cell", { name: "http://opcfoundation.org/UA/", exact: true }).count()).toBe(1);
    // Counted in the file as text.
    const variables = winch.match(/<UAVariable /g)?.length ?? 0;
    expect(
      await page
        .getByRole("listitem")
        .filter({ hasText: /^Variable\d/ })
        .innerText(),
    ).toContain(String(variables));
    expect(await listModels()).toEqual(before);
  });

  it("takes the file in as a model of the team", async () => {
    await choose("winch.xml", winch);
    await page.getByLabel("Name").fill("Harbour winch");
    await page.getByRole("button", { name: "Import as model" }).click();
    await page.waitForURL(/\/models\/[^/]+\/sheet$/);
    expect(await listModels()).toContain("Harbour winch");
  });

  const refused: readonly [what: string, name: string, content: string | Buffer, says: RegExp][] = [
    ["that is cut off", "cut.xml", winch.slice(0, winch.length / 2), /ends|closed|cut|complete/i],
    ["with another root element", "changes.xml", winch.replaceAll("UANodeSet", "UANodeSetChanges"), /UANodeSetChanges/],
    ["that is no XML", "notes.xml", "Braider 3: speed 120", /XML/],
    [
      "with entities",
      "bomb.xml",
      winch.replace("<UANodeSet", '<!DOCTYPE x [<!ENTITY a "aaaa">]><UANodeSet'),
      /document type|DOCTYPE|entit/i,
    ],
    [
      "that names a namespace index that it does not have",
      "index.xml",
      winch.replaceAll("ns=1;i=", "ns=7;i="),
      /index 7/,
    ],
  ];

  for (const [what, name, content, says] of refused) {
    it(`refuses a file ${what}, says where, and stores nothing`, async () => {
      const before = await listModels();
      await choose(name, content);
      const problems = page.getByRole("table", { name: "Problems of the file" });
      await problems.waitFor();
      expect(await problems.innerText()).toMatch(says);
      expect(await problems.innerText()).not.toMatch(/\bat .*\(.*:\d+:\d+\)/);
      const button = page.getByRole("button", { name: "Import as model" });
      expect((await button.count()) > 0 && (await button.isEnabled())).toBe(false);
      expect(await listModels()).toEqual(before);
      expect(visitor.complaints.filter((text) => !text.includes("422"))).toEqual([]);
    });
  }
});
