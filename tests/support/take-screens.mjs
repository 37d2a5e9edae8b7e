/**
 * `npm run screens`: starts the demo in a folder of its own and takes the pictures that the README shows, 1440×900, into
 * public/screens. Plain JavaScript, since it runs on its own.
 */
import { spawn } from "node:child_process";
import { mkdirSync, mkdtempSync, rmSync } from "node:fs";
import { createServer } from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { chromium } from "playwright-core";

const root = fileURLToPath(new URL("../..", import.meta.url));
const folder = join(root, "public", "screens");
const FLAGS = ["--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run", "--disable-background-networking"];
const START_LIMIT_MS = 120_000;
/** Long enough for a trend of some length in the watch strip. */
const WATCH_MS = 45_000;

function findFreePort() {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.on("error", reject);
    server.listen(0, "127.0.0.1", () => {
      const { port } = server.address();
      server.close(() => resolve(port));
    });
  });
}

async function startDemo(dataFolder) {
  const port = await findFreePort();
  const url = `http://127.0.0.1:${port}`;
  const env = { ...process.env, PORT: String(port), FERRULE_DATA: dataFolder };
  const child = spawn(process.execPath, ["app/cli/launch.mjs", "demo"], {
    cwd: root,
    env,
    stdio: ["ignore", "ignore", "inherit"],
  });
  for (const deadline = Date.now() + START_LIMIT_MS; Date.now() < deadline;) {
    if (child.exitCode !== null) break;
    const answer = await fetch(url, { redirect: "manual" }).catch(() => undefined);
    if (answer) return { child, url };
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
  child.kill("SIGTERM");
  throw new Error("The demo does not start");
}

async function signIn(page) {
  await page.goto("/sign-in");
  await page.getByRole("region", { name: "Demo accounts" }).getByRole("button", { name: "Tomas Lindqvist" }).click();
  await page.waitForURL((url) => url.pathname !== "/sign-in");
}

async function takeSheet(page) {
  await page.getByRole("region", { name: "Next steps" }).getByRole("link", { name: "Open" }).click();
  const speed = page.getByRole("option", { name: /^Spindle speed/ });
  await speed.waitFor();
  await speed.click();
  await page.getByRole("heading", { name: "Identity" }).waitFor();
  await page.waitForTimeout(1_000);
  await page.screenshot({ path: join(folder, "sheet.png") });
}

async function takeLive(page) {
  await page.goto("/");
  await page.getByRole("region", { name: "Next steps" }).getByRole("link", { name: "Start" }).click();
  await page.getByRole("button", { name: "Start test server" }).click();
  await page.getByRole("link", { name: "Watch values" }).click({ timeout: 60_000 });
  const open = (name) => page.getByRole("option", { name }).first().click({ timeout: 30_000 });
  await open(/Machines/);
  await open(/B3/);
  await open(/Environment/);
  await watch(page, /Gearbox vibration/, true);
  await watch(page, /Gearbox temperature/, true);
  await watch(page, /Humidity/, false);
  await watch(page, /Ambient pressure/, false);
  await open(/Process/);
  await watch(page, /Carriage position/, true);
  await watch(page, /Spindle speed/, true);
  await page.waitForTimeout(WATCH_MS);
  await page.screenshot({ path: join(folder, "live.png") });
}

/** The strip starts with some members of its own choice. */
async function watch(page, name, isWanted) {
  await page.getByRole("option", { name }).first().click({ timeout: 30_000 });
  const card = page.getByRole("region", { name: "Value" });
  await card.getByRole("heading", { name }).waitFor();
  const button = card.getByRole("button", { name: isWanted ? /^On the watch strip/ : /^Off the watch strip/ });
  if (await button.isVisible()) await button.click();
}

const dataFolder = mkdtempSync(join(tmpdir(), "ferrule-screens-"));
mkdirSync(folder, { recursive: true });
let demo;
let browser;
try {
  demo = await startDemo(dataFolder);
  browser = await chromium.launch({ executablePath: "/usr/bin/chromium", args: FLAGS });
  const context = await browser.newContext({
    baseURL: demo.url,
    viewport: { width: 1440, height: 900 },
    colorScheme: "light",
    reducedMotion: "reduce",
  });
  const page = await context.newPage();
  page.setDefaultTimeout(20_000);
  await signIn(page);
  await takeSheet(page);
  await takeLive(page);
  console.log(`Taken into ${folder}`);
} finally {
  await browser?.close();
  demo?.child.kill("SIGTERM");
  rmSync(dataFolder, { recursive: true, force: true });
}
