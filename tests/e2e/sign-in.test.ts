/** Who gets in, how, and what the screens then offer to whom. */
import type { Browser } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { openBrowser, openWindow, type Visitor } from "../support/browser";

/** The accounts of the demo, as the README lists them. */
const people = [
  { name: "Ines Okafor", email: "ines@merrow.example", role: "administrator", edits: true },
  { name: "Tomas Lindqvist", email: "tomas@merrow.example", role: "engineer", edits: true },
  { name: "Priya Raman", email: "priya@merrow.example", role: "integrator", edits: false },
  { name: "Joao Brandt", email: "joao@merrow.example", role: "reviewer", edits: false },
  { name: "Mei Castellan", email: "mei@merrow.example", role: "developer", edits: false },
] as const;

let app: AppServer;
let browser: Browser;

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
});

afterAll(async () => {
  await browser?.close();
  await app?.stop();
});

async function visit<T>(use: (visitor: Visitor) => Promise<T>): Promise<T> {
  const visitor = await openWindow(browser, app.url);
  try {
    return await use(visitor);
  } finally {
    await visitor.context.close();
  }
}

describe("the demo's sign-in page", () => {
  it("prints where it is ready as its last line", () => {
    expect(app.output().trim().split("\n").at(-1)).toMatch(/^Ferrule ready: http:\/\/localhost:\d+$/);
  });

  for (const person of people) {
    it(`lets ${person.name} in with one press and offers what the ${person.role} may do`, async () => {
      await visit(async ({ page, complaints }) => {
        await page.goto("/sign-in");
        await page.getByRole("region", { name: "Demo accounts" }).getByRole("button", { name: person.name }).click();
        await page.waitForURL((url) => url.pathname !== "/sign-in");
        await page.goto("/models");
        await page.getByRole("heading", { name: "Models", level: 1 }).waitFor();
        expect(await page.getByRole("link", { name: "New model" }).count()).toBe(person.edits ? 1 : 0);
        expect(complaints).toEqual([]);
      });
    });
  }

  it("answers a wrong password without saying which part was wrong", async () => {
    const answers: string[] = [];
    for (const [email, password] of [
      ["ines@merrow.example", "not-the-password"],
      ["nobody@merrow.example", "not-the-password"],
    ] as const) {
      await visit(async ({ page }) => {
        await page.goto("/sign-in");
        await page.getByLabel("E-mail").fill(email);
        await page.getByLabel("Password").fill(password);
        await page.getByRole("button", { name: "Sign in", exact: true }).click();
        answers.push(await page.getByRole("alert").innerText());
      });
    }
    expect(answers[0]).toBe(answers[1]);
    expect(answers[0]).not.toMatch(/ines|nobody/i);
  });

  it("leads back to the page that was asked for", async () => {
    await visit(async ({ page }) => {
      await page.goto("/models");
      await page.waitForURL(/\/sign-in/);
      await page.getByRole("button", { name: "Mei Castellan" }).click();
      await page.waitForURL((url) => url.pathname === "/models");
    });
  });

  it("forgets who was there after signing out", async () => {
    await visit(async ({ page }) => {
      await page.goto("/sign-in");
      await page.getByRole("button", { name: "Mei Castellan" }).click();
      await page.waitForURL((url) => url.pathname !== "/sign-in");
      await page.getByRole("button", { name: /Mei Castellan|Account/ }).click();
      await page.getByRole("button", { name: "Sign out" }).click();
      await page.waitForURL(/\/sign-in/);
      await page.goto("/models");
      expect(new URL(page.url()).pathname).toBe("/sign-in");
    });
  });
});
