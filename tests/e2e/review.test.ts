/** Two people, two browsers, one review: ask, comment, change, void, approve, release, verify; and the mails that tell of it. */
import { execFile } from "node:child_process";
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { Browser, Download, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { findAccessibilityProblems, openBrowser, openWindow, signInAs, type Visitor } from "../support/browser";
import { findModelId } from "../support/demo-session";
import { projectRoot } from "../support/source-files";

/** Process/RecipeNumber of the demo. */
const NODE = "nsu=http://merrow.example/UA/RopeBraider/;i=6033";

let app: AppServer;
let browser: Browser;
let tomas: Visitor;
let joao: Visitor;
let reviewPath: string;
const folder = mkdtempSync(join(tmpdir(), "ferrule-review-"));

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
  tomas = await openWindow(browser, app.url);
  joao = await openWindow(browser, app.url, { theme: "dark" });
  await Promise.all([signInAs(tomas, "Tomas Lindqvist"), signInAs(joao, "Joao Brandt")]);
});

afterAll(async () => {
  await browser?.close();
  await app?.stop();
  rmSync(folder, { recursive: true, force: true });
});

async function describeRecipe(page: Page, text: string): Promise<void> {
  const modelId = await findModelId(page, "Rope braider");
  await page.goto(`/models/${modelId}/register?node=${encodeURIComponent(NODE)}`);
  const field = page.getByRole("region", { name: "Text and access" }).getByRole("textbox", { name: "Description" });
  await field.fill(text);
  await page.keyboard.press("Tab");
  await page
    .getByText(/^Saved/)
    .first()
    .waitFor();
}

async function keep(download: Promise<Download>, name: string): Promise<string> {
  const path = join(folder, name);
  await (await download).saveAs(path);
  return path;
}

function verify(...args: string[]): Promise<{ code: number; out: string }> {
  return new Promise((resolve) => {
    const command = ["app/cli/launch.mjs", "ferrule", "verify", ...args];
    execFile(process.execPath, command, { cwd: projectRoot }, (error, out) => {
      resolve({ code: error ? Number(error.code) : 0, out });
    });
  });
}

describe("a review by two people", () => {
  it("is asked for, and stands in the reviewer's list", async () => {
    await describeRecipe(tomas.page, "Recipe of the autumn round.");
    await tomas.page.goto("/reviews");
    await tomas.page.getByRole("combobox", { name: "Model" }).selectOption({ label: "Rope braider" });
    await tomas.page.getByRole("textbox", { name: "What it is about" }).fill("Autumn round");
    await tomas.page.getByRole("checkbox", { name: "Joao Brandt" }).check();
    await tomas.page.getByRole("button", { name: "Ask for a review" }).click();
    await tomas.page.waitForURL(/\/reviews\/\w{20}$/);
    reviewPath = new URL(tomas.page.url()).pathname;
    await joao.page.goto("/reviews");
    const row = joao.page.getByRole("row", { name: /Autumn round/ });
    await row.getByText("your turn").waitFor();
    await row.getByRole("link", { name: "Autumn round" }).click();
    await joao.page.getByRole("heading", { name: "Autumn round" }).waitFor();
    expect(await findAccessibilityProblems(joao.page)).toEqual([]);
  });

  it("carries comments and a suggestion to the author, who applies it with one key", async () => {
    const { page } = joao;
    await page
      .getByRole("row", { name: /RecipeNumber/ })
      .filter({ hasText: "Description" })
      .getByRole("button")
      .click();
    await page
      .getByRole("region", { name: "on this change" })
      .getByRole("textbox", { name: "Comment" })
      .fill("Which round?");
    await page.getByRole("region", { name: "on this change" }).getByRole("button", { name: "Send" }).click();
    await page.getByText("Which round?").waitFor();
    await page.getByRole("button", { name: "Suggest to take it back" }).click();
    await page.getByText(/^Suggestion: keep it as it was/).waitFor();

    await tomas.page.goto(reviewPath);
    await tomas.page
      .getByRole("row", { name: /RecipeNumber/ })
      .filter({ hasText: "Description" })
      .getByRole("button")
      .click();
    await tomas.page.getByRole("textbox", { name: "Reply to Joao Brandt" }).first().fill("The one of 2026.");
    await tomas.page.getByRole("button", { name: "Send" }).first().click();
    await tomas.page.getByText("The one of 2026.").waitFor();
    await tomas.page.getByRole("button", { name: "Apply" }).waitFor();
    await tomas.page.locator("body").press("a");
    await tomas.page.getByText("suggestion applied by Tomas Lindqvist").waitFor();
    await tomas.page.getByRole("button", { name: /^Bring in 1 edit/ }).click();
    await joao.page.getByText("The one of 2026.").waitFor();
  });

  it("cannot be approved by its author, and loses the approval when the model is edited", async () => {
    await expect
      .poll(() => tomas.page.getByRole("button", { name: "Approve" }).getAttribute("aria-disabled"))
      .toBe("true");
    await joao.page.goto(reviewPath);
    await joao.page.getByRole("button", { name: "Approve" }).click();
    await joao.page.getByText(/^approves revision/).waitFor();
    await describeRecipe(tomas.page, "Number of the recipe that runs now.");
    await joao.page.getByText("void: Tomas Lindqvist edited").waitFor();
    expect(await joao.page.getByRole("button", { name: "Release", exact: true }).getAttribute("aria-disabled")).toBe(
      "true",
    );
    await tomas.page.goto(reviewPath);
    await tomas.page.getByRole("button", { name: /^Bring in 1 edit/ }).click();
    await tomas.page.getByRole("button", { name: /^Bring in/ }).waitFor({ state: "detached" });
  });

  it("is approved and released; the bundle is verified with the command line", async () => {
    const { page } = joao;
    await page.goto(reviewPath);
    await page.getByRole("button", { name: "Approve" }).click();
    await page.getByText(/^approves revision/).waitFor();
    await page.getByRole("textbox", { name: "Version" }).fill("2.0.0");
    await page.getByRole("button", { name: "Release", exact: true }).click();
    await page.waitForURL(/\/releases\/\w{20}$/);
    await page.getByRole("heading", { name: /Rope braider 2\.0\.0/ }).waitFor();
    expect(await findAccessibilityProblems(page)).toEqual([]);
    const hash =
      (await page
        .getByText(/^[0-9a-f]{64}$/)
        .first()
        .textContent()) ?? "";
    await page.getByRole("button", { name: "Build it again and compare" }).click();
    await page.getByText("Built again from its revision: the same bytes").waitFor();
    const bundle = page.waitForEvent("download");
    await page.getByRole("link", { name: "Bundle" }).click();
    const zip = await keep(bundle, "bundle.zip");
    const key = page.waitForEvent("download");
    await page.getByRole("link", { name: "ferrule-key.pem" }).click();
    const answer = await verify(zip, "--key", await keep(key, "key.pem"), "--json");
    expect([answer.code, JSON.parse(answer.out)]).toMatchObject([
      0,
      { ok: true, sha256: hash, model: { version: "2.0.0" } },
    ]);
  });

  it("is told by mail: the fake mail server has received all of it", async () => {
    const ines = await openWindow(browser, app.url);
    await signInAs(ines, "Ines Okafor");
    await ines.page.goto("/team/outbox");
    for (const subject of [
      /^Review 1: Autumn round/,
      /Joao Brandt comments/,
      /Joao Brandt approves/,
      /approval void/,
      /2\.0\.0 is released/,
    ]) {
      await ines.page.getByRole("button", { name: subject }).first().waitFor();
    }
    await expect
      .poll(
        async () => {
          await ines.page.reload();
          await ines.page.getByRole("table").waitFor();
          return ines.page.getByRole("row").filter({ hasText: "waiting" }).count();
        },
        { timeout: 15_000 },
      )
      .toBe(0);
    // Before a mail is opened: its HTML stands in a frame without scripts, into which axe cannot look.
    expect(await findAccessibilityProblems(ines.page)).toEqual([]);
    await ines.page
      .getByRole("button", { name: /^Review 1: Autumn round/ })
      .first()
      .click();
    await ines.page.getByText(/List-Unsubscribe-Post/).waitFor();
    expect([...tomas.complaints, ...joao.complaints, ...ines.complaints]).toEqual([]);
  });
});
