/**
 * `npm test`: everything that must hold, in one go, with one total at the end.
 *
 * Lint and types run beside the build; the Vitest projects follow one after another, since two of them would fight for
 * the same cores. Each of Chromium, build, lint and types counts as one test. A skipped test counts as failed, so that
 * nothing is left out silently; a Vitest that crashed or met an unhandled error counts as one failure more.
 */
import { spawn } from "node:child_process";
import { existsSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import { availableParallelism, tmpdir } from "node:os";
import { join, relative } from "node:path";
import { fileURLToPath } from "node:url";

const root = fileURLToPath(new URL("../..", import.meta.url));
const scratch = mkdtempSync(join(tmpdir(), "ferrule-test-"));
const CHROMIUM = "/usr/bin/chromium";
const MINUTE = 60_000;
const MAX_SHOWN_CHARACTERS = 12_000;
const limits = { check: 5 * MINUTE, install: 6 * MINUTE, suite: 11 * MINUTE };
/** What still runs then is stopped and counted as failed. */
const OVERALL_LIMIT = 18.5 * MINUTE;
const total = { passed: 0, failed: 0 };
const children = new Set();
const started = Date.now();

/** Runs a program in the project's folder; answers its exit code (null when it was stopped) and what it printed. */
function run(command, args, { limit, env = {} }) {
  return new Promise((resolve) => {
    const child = spawn(command, args, { cwd: root, env: { ...process.env, ...env }, detached: true });
    children.add(child);
    let output = "";
    const keep = (chunk) => (output = (output + chunk).slice(-1_000_000));
    child.stdout.on("data", keep);
    child.stderr.on("data", keep);
    const since = Date.now();
    const left = Math.max(1_000, Math.min(limit, started + OVERALL_LIMIT - since));
    const timer = setTimeout(() => {
      keep(`\nStopped after ${seconds(since)}.\n`);
      stop(child);
    }, left);
    const finish = (code) => {
      clearTimeout(timer);
      children.delete(child);
      resolve({ code, output });
    };
    child.on("error", (error) => {
      keep(error.message);
      finish(null);
    });
    child.on("close", finish);
    // A grandchild that was left behind would hold the pipes open.
    child.on("exit", () => setTimeout(() => children.has(child) && stop(child), 3_000).unref());
  });
}

/** Ends a child with everything that it started: it leads a process group of its own. */
function stop(child) {
  try {
    process.kill(-child.pid, "SIGKILL");
  } catch {
    child.kill("SIGKILL");
  }
}

function bin(name) {
  return join(root, "node_modules/.bin", name);
}

function seconds(since) {
  return `${((Date.now() - since) / 1000).toFixed(1)} s`;
}

function report(name, passed, failed, since) {
  total.passed += passed;
  total.failed += failed;
  console.log(
    `${failed === 0 ? "ok  " : "FAIL"} ${name.padEnd(14)} ${passed} passed, ${failed} failed  (${seconds(since)})`,
  );
}

function show(text) {
  const trimmed = text.trim();
  const cut = trimmed.length > MAX_SHOWN_CHARACTERS ? `…${trimmed.slice(-MAX_SHOWN_CHARACTERS)}` : trimmed;
  if (cut) console.log(cut.replace(/^/gm, "     "));
}

/** One program, one test: passed when it exits with 0. */
async function check(name, steps) {
  const since = Date.now();
  for (const [command, ...args] of steps) {
    const { code, output } = await run(command, args, { limit: limits.check });
    if (code === 0) continue;
    report(name, 0, 1, since);
    show(output);
    return false;
  }
  report(name, 1, 0, since);
  return true;
}

/** Chromium drives the browser tests; root installs it from Debian's packages, others are told how. */
async function checkChromium() {
  const since = Date.now();
  if (!existsSync(CHROMIUM) && process.getuid?.() === 0) {
    console.log("     Chromium is missing; installing it from Debian's packages …");
    const options = { limit: limits.install, env: { DEBIAN_FRONTEND: "noninteractive" } };
    const updated = await run("apt-get", ["update", "-q"], options);
    const installed = await run("apt-get", ["install", "-y", "-q", "--no-install-recommends", "chromium"], options);
    if (installed.code !== 0) show(updated.output + installed.output);
  }
  const found = existsSync(CHROMIUM);
  report("chromium", found ? 1 : 0, found ? 0 : 1, since);
  if (!found) show(`${CHROMIUM} is missing. Install it as root: apt-get update && apt-get install -y chromium`);
  return found;
}

async function runSuite(project) {
  const since = Date.now();
  const file = join(scratch, `${project}.json`);
  const args = ["run", "--project", project, "--reporter=json", `--outputFile.json=${file}`, "--passWithNoTests=false"];
  const { code, output } = await run(bin("vitest"), args, { limit: limits.suite });
  const suite = existsSync(file) ? countResults(JSON.parse(readFileSync(file, "utf8"))) : { passed: 0, failures: [] };
  if (code !== 0 && suite.failures.length === 0) {
    suite.failures.push({ name: `${project}: Vitest ended with ${code ?? "no"} exit code`, message: output });
  }
  report(project, suite.passed, suite.failures.length, since);
  for (const failure of suite.failures) {
    console.log(`   ✗ ${failure.name}`);
    show(failure.message);
  }
}

/** A file that could not be loaded has no test results and counts as one failure. */
function countResults(json) {
  let passed = 0;
  const failures = [];
  for (const file of json.testResults) {
    const place = relative(root, file.name);
    if (file.status === "failed" && file.assertionResults.every((test) => test.status === "passed")) {
      failures.push({ name: place, message: file.message });
    }
    for (const test of file.assertionResults) {
      if (test.status === "passed") passed++;
      else failures.push({ name: `${place} > ${test.fullName}`, message: describeFailure(test) });
    }
  }
  return { passed, failures };
}

function describeFailure(test) {
  return test.status === "failed"
    ? test.failureMessages.join("\n")
    : `The test did not run (${test.status}); a test may not be skipped.`;
}

async function runAll() {
  console.log(`Node.js ${process.versions.node}, ${availableParallelism()} cores`);
  const hasChromium = await checkChromium();
  const [built] = await Promise.all([
    check("build", [[process.execPath, "app/cli/launch.mjs", "build"]]),
    check("types", [[bin("react-router"), "typegen"], [bin("tsc")]]).then(() =>
      check("types: domain", [[bin("tsc"), "-p", "app/domain/tsconfig.json"]]),
    ),
    check("lint", [[bin("eslint"), ".", "--max-warnings=0"]]),
  ]);
  await runSuite("unit");
  await runSuite("integration");
  await runSuite("conformance");
  if (hasChromium && built) await runSuite("e2e");
  else {
    report("e2e", 0, 1, Date.now());
    show(`The browser tests did not run: ${hasChromium ? "the build failed" : "Chromium is missing"}.`);
  }
}

for (const signal of ["SIGINT", "SIGTERM"]) {
  process.once(signal, () => {
    for (const child of children) stop(child);
    process.exit(130);
  });
}

try {
  await runAll();
} finally {
  rmSync(scratch, { recursive: true, force: true });
}
console.log(`Took ${seconds(started)}.`);
console.log(`${total.passed} passed, ${total.failed} failed`);
process.exitCode = total.failed === 0 ? 0 : 1;
