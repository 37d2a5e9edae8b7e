/** Every screen in both themes by axe: WCAG 2.1 A and AA. Nothing on any of them may complain in the console. */
import type { Browser, Locator, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import { findAccessibilityProblems, openBrowser, openWindow, signInAs, type Theme } from "../support/browser";
import { findModelId, startTestServer } from "../support/demo-session";

let app: AppServer;
let browser: Browser;
let ids: { braider: string; hall: string; server: string };

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
  const visitor = await openWindow(browser, app.url);
  await signInAs(visitor, "Ines Okafor");
  const braider = await findModelId(visitor.page, "Rope braider");
  const hall = await findModelId(visitor.page, "Merrow hall");
  ids = { braider, hall, server: await startTestServer(visitor.page, hall) };
  await visitor.context.close();
});

afterAll(async () => {
  await browser?.close();
  await app?.stop();
});

type Screen = { name: string; path: () => string; ready: (page: Page) => Locator };

const spindleSpeed = encodeURIComponent("nsu=http://merrow.example/UA/RopeBraider/;i=6017");
const firstMachine = encodeURIComponent("nsu=http://merrow.example/UA/Hall/;i=1001");

/** Each with what is there once it has been drawn. */
const screens: readonly Screen[] = [
  { name: "Park", path: () => "/", ready: (page) => page.getByRole("table", { name: /Machines of the park/ }) },
  { name: "Models", path: () => "/models", ready: (page) => page.getByRole("table", { name: "Models of the team" }) },
  { name: "New model", path: () => "/models/new", ready: (page) => page.getByRole("button", { name: "Create model" }) },
  { name: "Import", path: () => "/models/import", ready: (page) => page.getByText("Drop a NodeSet2 file here") },
  {
    name: "Sheet",
    path: () => `/models/${ids.braider}/sheet?node=${spindleSpeed}`,
    ready: (page) => page.getByRole("listbox", { name: "Members of Process" }),
  },
  {
    name: "Register",
    path: () => `/models/${ids.braider}/register?node=${spindleSpeed}`,
    ready: (page) => page.getByRole("treegrid", { name: "Members" }),
  },
  {
    name: "Findings",
    path: () => `/models/${ids.braider}/findings`,
    ready: (page) => page.getByRole("heading", { name: "Findings", level: 1 }),
  },
  { name: "Types", path: () => `/models/${ids.braider}/types`, ready: (page) => page.getByRole("main") },
  { name: "Signals", path: () => `/models/${ids.braider}/signals`, ready: (page) => page.getByRole("main") },
  { name: "Roll-out", path: () => `/models/${ids.hall}/roll-out`, ready: (page) => page.getByRole("main") },
  {
    name: "Devices",
    path: () => "/devices",
    ready: (page) => page.getByRole("table", { name: "Devices of the library" }),
  },
  { name: "Sources", path: () => "/sources", ready: (page) => page.getByRole("region", { name: "Port plan" }) },
  {
    name: "Wiring list",
    path: () => "/sources/wiring-list",
    ready: (page) => page.getByRole("table", { name: "Ports of M1" }),
  },
  { name: "Controller tags", path: () => "/sources/tags", ready: (page) => page.getByText("Drop a tag list here") },
  {
    name: "Mapping",
    path: () =>
      `/models/${ids.braider}/mapping?target=${encodeURIComponent("nsu=http://merrow.example/UA/RopeBraider/;i=6005")}`,
    ready: (page) => page.getByRole("region", { name: "Mapping of Process/CreelFill" }),
  },
  {
    name: "Decode bench",
    path: () => `/models/${ids.braider}/mapping?view=bench`,
    ready: (page) => page.getByRole("table", { name: "Nodes with what the bytes give" }),
  },
  {
    name: "Deliver",
    path: () => `/models/${ids.braider}/mapping?view=deliver`,
    ready: (page) => page.getByRole("heading", { name: "Export templates" }),
  },
  {
    name: "Survey",
    path: () => `/models/${ids.braider}/survey`,
    ready: (page) => page.getByRole("table", { name: "Surveyed signals" }),
  },
  {
    name: "Bindings",
    path: () => `/models/${ids.hall}/mapping`,
    ready: (page) => page.getByRole("table", { name: "Roles of the machines and where they are found" }),
  },
  { name: "Source text", path: () => `/models/${ids.braider}/source`, ready: (page) => page.getByRole("main") },
  { name: "Revisions", path: () => `/models/${ids.braider}/revisions`, ready: (page) => page.getByRole("main") },
  { name: "About", path: () => `/models/${ids.braider}/about`, ready: (page) => page.getByRole("main") },
  { name: "Test server", path: () => `/models/${ids.hall}/test-server`, ready: (page) => page.getByRole("article") },
  {
    name: "Library",
    path: () => "/library",
    ready: (page) => page.getByRole("heading", { name: "Library", level: 1 }),
  },
  { name: "Team", path: () => "/team", ready: (page) => page.getByRole("heading", { name: "Team", level: 1 }) },
  { name: "Live, list", path: () => "/live", ready: (page) => page.getByRole("heading", { level: 1 }) },
  {
    name: "Live",
    path: () => `/live/${ids.server}?node=${firstMachine}`,
    ready: (page) => page.getByRole("listbox", { name: "Members of Objects" }).getByRole("option").first(),
  },
  { name: "Not found", path: () => "/no-such-page", ready: (page) => page.getByRole("heading", { level: 1 }) },
];

for (const theme of ["light", "dark"] satisfies Theme[]) {
  describe(`in the ${theme} theme`, () => {
    it("the sign-in page can be used by everybody", async () => {
      const { page, context } = await openWindow(browser, app.url, { theme });
      await page.goto("/sign-in");
      expect(await findAccessibilityProblems(page)).toEqual([]);
      await context.close();
    });

    it("every screen can be used by everybody", async () => {
      const visitor = await openWindow(browser, app.url, { theme });
      await signInAs(visitor, "Ines Okafor");
      const found: Record<string, string[]> = {};
      for (const screen of screens) {
        await visitor.page.goto(screen.path());
        await screen.ready(visitor.page).waitFor();
        const problems = await findAccessibilityProblems(visitor.page);
        if (problems.length > 0) found[screen.name] = problems;
      }
      expect(found).toEqual({});
      expect(visitor.complaints.filter((text) => !text.includes("/no-such-page"))).toEqual([]);
      await visitor.context.close();
    }, 180_000);
  });
}
