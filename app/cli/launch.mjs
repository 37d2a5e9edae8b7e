/**
 * Starts what an npm script names, and builds before that what is stale of what it needs. Plain JavaScript, since Node.js
 * 20 runs no TypeScript. The target runs in this very process, so that signals reach it and its exit code is ours.
 * Nothing but the target writes to standard output: the command line's JSON must stay pure.
 */
import { spawn } from "node:child_process";
import { createHash } from "node:crypto";
import { closeSync, existsSync, openSync, readdirSync, readFileSync, rmSync, writeFileSync, writeSync } from "node:fs";
import { join } from "node:path";
import { setTimeout as wait } from "node:timers/promises";
import { fileURLToPath, pathToFileURL } from "node:url";

const root = fileURLToPath(new URL("../..", import.meta.url));
const lockFile = join(root, "node_modules", ".ferrule-build-lock");
const LOCK_LIMIT_MS = 300_000;

const shared = ["package-lock.json", "tsconfig.json", "nodesets/manifest.json"];

/** The two bundles: what they are made of, how, and a file that keeps the fingerprint of what they were made of. */
const bundles = {
  web: {
    sources: ["app", "public", "vite.config.ts", "react-router.config.ts", ...shared],
    command: ["react-router", "build"],
    stamp: join(root, "build", "server", ".made-of"),
  },
  node: {
    sources: ["app", "tests/bench", "tests/support", "vite.node.config.ts", ...shared],
    command: ["vite", "build", "-c", "vite.node.config.ts"],
    stamp: join(root, "build", "node", ".made-of"),
  },
};

const targets = {
  build: { needs: ["web", "node"] },
  server: { needs: ["web", "node"], runs: "server.js" },
  demo: { needs: ["web", "node"], runs: "server.js", args: ["--demo"] },
  ferrule: { needs: ["node"], runs: "cli.js" },
  bench: { needs: ["node"], runs: "bench.js" },
  "bench:browser": { needs: ["web", "node"], runs: "bench-browser.js" },
};

function stopWith(message) {
  console.error(message);
  process.exit(1);
}

function* listFiles(path) {
  const entries = readdirSync(join(root, path), { withFileTypes: true }).sort((a, b) => (a.name < b.name ? -1 : 1));
  for (const entry of entries) {
    const inner = `${path}/${entry.name}`;
    if (entry.isDirectory()) yield* listFiles(inner);
    else yield inner;
  }
}

/** What a bundle is made of, by content, so that neither clocks nor checkouts matter. */
function fingerprint(sources) {
  const hash = createHash("sha256");
  const add = (path) => hash.update(`${path}\0`).update(readFileSync(join(root, path)));
  for (const source of sources) {
    if (!existsSync(join(root, source))) continue;
    if (/\.\w+$/.test(source)) add(source);
    else for (const path of listFiles(source)) add(path);
  }
  return hash.digest("hex");
}

function isFresh(bundle, wanted) {
  return existsSync(bundle.stamp) && readFileSync(bundle.stamp, "utf8") === wanted;
}

function run(command, args) {
  return new Promise((resolve) => {
    const child = spawn(join(root, "node_modules", ".bin", command), args, {
      cwd: root,
      // A test run that starts the application must not turn its build into one for tests.
      env: { ...process.env, NODE_ENV: "production", VITEST: "" },
      stdio: ["ignore", "pipe", "pipe"],
    });
    let output = "";
    child.stdout.on("data", (chunk) => (output += chunk));
    child.stderr.on("data", (chunk) => (output += chunk));
    child.on("error", (error) => resolve({ code: 1, output: error.message }));
    child.on("close", (code) => resolve({ code, output }));
  });
}

async function bring(name) {
  const bundle = bundles[name];
  const wanted = fingerprint(bundle.sources);
  if (isFresh(bundle, wanted)) return;
  console.error(`Building ${name === "web" ? "the web application" : "what runs beside it"} …`);
  const [command, ...args] = bundle.command;
  const { code, output } = await run(command, args);
  if (code !== 0) stopWith(`${output.trim()}\n\nThe build failed.`);
  writeFileSync(bundle.stamp, wanted);
}

/** One build at a time in this folder; a lock whose process is gone counts for nothing. */
async function withLock(work) {
  for (const deadline = Date.now() + LOCK_LIMIT_MS; ; await wait(200)) {
    if (takeLock()) break;
    if (Date.now() > deadline)
      stopWith(`Another build has run for more than five minutes. Remove ${lockFile} when there is none.`);
  }
  try {
    await work();
  } finally {
    rmSync(lockFile, { force: true });
  }
}

function takeLock() {
  try {
    const file = openSync(lockFile, "wx");
    writeSync(file, String(process.pid));
    closeSync(file);
    return true;
  } catch (error) {
    if (error.code !== "EEXIST") throw error;
  }
  if (!isAlive(readHolder())) rmSync(lockFile, { force: true });
  return false;
}

function readHolder() {
  try {
    return Number(readFileSync(lockFile, "utf8")) || undefined;
  } catch {
    return undefined;
  }
}

/** An empty lock is one that is just being written. */
function isAlive(pid) {
  if (pid === undefined) return true;
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return error.code === "EPERM";
  }
}

async function bringAll(names) {
  const isAllFresh = () => names.every((name) => isFresh(bundles[name], fingerprint(bundles[name].sources)));
  if (isAllFresh()) return;
  await withLock(async () => {
    // The web build comes first, since it may empty the folder that both stand in.
    for (const name of names) await bring(name);
  });
}

/** Serves the code with reloading; what runs beside it is built anew at each change. */
async function develop(args) {
  await bringAll(["node"]);
  const { HOST = "127.0.0.1", PORT = "3000" } = process.env;
  const start = (command, list) =>
    spawn(join(root, "node_modules", ".bin", command), list, { cwd: root, stdio: ["inherit", "inherit", "inherit"] });
  const children = [
    start("vite", ["build", "-c", "vite.node.config.ts", "--watch", "--logLevel", "warn"]),
    start("react-router", ["dev", "--host", HOST, "--port", PORT, ...args]),
  ];
  const endAll = () => children.forEach((child) => child.kill("SIGTERM"));
  process.on("SIGINT", endAll);
  process.on("SIGTERM", endAll);
  children[1].on("exit", (code) => {
    endAll();
    process.exitCode = code ?? 0;
  });
}

const [name, ...args] = process.argv.slice(2);
if (!existsSync(join(root, "node_modules", "vite"))) stopWith("The packages are not installed. Run `npm ci` first.");
const target = targets[name];
if (name === "dev") await develop(args);
else if (!target) stopWith(`Unknown target: ${name}. Known are dev, ${Object.keys(targets).join(", ")}.`);
else {
  await bringAll(target.needs);
  if (target.runs) {
    const file = join(root, "build", "node", target.runs);
    process.argv = [process.argv[0], file, ...(target.args ?? []), ...args];
    await import(pathToFileURL(file).href);
  }
}
