/** Chromium for the browser tests: one browser a file, one context a person, and what the page complained about. */
import { AxeBuilder } from "@axe-core/playwright";
import { chromium, type Browser, type BrowserContext, type Page } from "playwright-core";

const CHROMIUM = "/usr/bin/chromium";
const FLAGS = [
  "--no-sandbox",
  "--disable-gpu",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
];

export type Theme = "light" | "dark";

/** A browser window of one person; `complaints` holds errors of the page and of its console. */
export type Visitor = { readonly page: Page; readonly context: BrowserContext; readonly complaints: string[] };

export async function openBrowser(): Promise<Browser> {
  return chromium.launch({ executablePath: CHROMIUM, args: FLAGS });
}

export async function openWindow(
  browser: Browser,
  baseURL: string,
  options: { theme?: Theme; width?: number; height?: number } = {},
): Promise<Visitor> {
  const context = await browser.newContext({
    baseURL,
    colorScheme: options.theme ?? "light",
    viewport: { width: options.width ?? 1440, height: options.height ?? 900 },
    reducedMotion: "reduce",
    acceptDownloads: true,
  });
  const page = await context.newPage();
  page.setDefaultTimeout(15_000);
  return { page, context, complaints: listenForComplaints(page) };
}

/** A second tab of the same person. */
export async function openTab(visitor: Visitor): Promise<Visitor> {
  const page = await visitor.context.newPage();
  page.setDefaultTimeout(15_000);
  return { page, context: visitor.context, complaints: listenForComplaints(page) };
}

function listenForComplaints(page: Page): string[] {
  const complaints: string[] = [];
  page.on("pageerror", (error) => complaints.push(`${page.url()}: ${error.stack ?? error.message}`));
  page.on("console", (message) => {
    if (message.type() === "error") complaints.push(`${page.url()}: ${message.text()}`);
  });
  return complaints;
}

/** Violations of WCAG 2.1 A and AA that axe finds on the page as it stands, one line each. */
export async function findAccessibilityProblems(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page })
    .withTags(["wcag2a", "wcag2aa", "wcag21a", "wcag21aa"])
    .analyze();
  return violations.flatMap((violation) =>
    violation.nodes.map(
      (node) => `${violation.id} (${violation.impact ?? "?"}): ${violation.help}: ${node.target.join(" ")}`,
    ),
  );
}

/** Signs in at the demo with one press and waits for the first page. */
export async function signInAs({ page }: Visitor, name: string): Promise<void> {
  await page.goto("/sign-in");
  await page.getByRole("region", { name: "Demo accounts" }).getByRole("button", { name }).click();
  await page.waitForURL((url) => url.pathname !== "/sign-in");
}
