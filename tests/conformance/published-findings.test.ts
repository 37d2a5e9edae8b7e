/**
 * False alarms: the checker over every published NodeSet of the npm package, with the models that each requires. What it
 * calls an error is recorded in `expectations/`, with rule, node, clause and the facts quoted from the file, so that a
 * reader can see that the published file breaks the clause. A new error fails here until somebody has looked at it
 * (`npx vitest run --project conformance published-findings -u` records it).
 */
import { afterAll, expect, test } from "vitest";
import type { Finding } from "~/domain/checks/finding";
import { runChecks } from "~/domain/checks/run-checks";
import { loadPublishedSpace, PUBLISHED } from "../support/published-scan";

const counts = new Map<string, Map<string, number>>();

function toExpectation({ rule, nodeId, path, message, clause, facts }: Finding): unknown {
  return { rule, node: nodeId, path, message, clause, facts };
}

test.each(PUBLISHED)("$file has the recorded errors only", async (entry) => {
  const errors = runChecks(loadPublishedSpace(entry)).filter((f) => f.severity === "error");
  for (const { rule } of errors) {
    const files = counts.get(rule) ?? new Map<string, number>();
    files.set(entry.file, (files.get(entry.file) ?? 0) + 1);
    counts.set(rule, files);
  }
  const recorded = `${JSON.stringify(errors.map(toExpectation), undefined, 1)}\n`;
  await expect(recorded).toMatchFileSnapshot(`expectations/${entry.file.replace(/\.xml$/, "").replace("/", "-")}.json`);
});

afterAll(() => {
  for (const [rule, files] of [...counts].sort(([a], [b]) => a.localeCompare(b))) {
    console.log(`${rule}: ${[...files].map(([file, n]) => `${n} in ${file}`).join(", ")}`);
  }
});
