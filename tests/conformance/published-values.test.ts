import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { dirname, join } from "node:path";
import { describe, expect, it } from "vitest";
import { hasValueAttributes } from "~/domain/address-space/node";
import { SpaceDataTypes } from "~/domain/nodeset/values/data-type-shapes";
import { readValue } from "~/domain/nodeset/values/read-value";
import type { Variant } from "~/domain/nodeset/values/variant";
import { writeValue } from "~/domain/nodeset/values/write-value";
import { loadPublishedSpace, PUBLISHED } from "../support/published-scan";

/** What a value holds that stays raw, with the reason. */
function listRaw(variant: Variant): string[] {
  const values = variant.shape === "scalar" ? [variant.value] : variant.values;
  return values.flatMap((value) => {
    if (value === null || typeof value !== "object" || !("kind" in value)) return [];
    return value.kind === "raw" ? [value.reason] : Object.values(value.fields).flatMap(listRaw);
  });
}

describe("values of the published NodeSets", () => {
  let total = 0;

  it.each(PUBLISHED.map((entry) => [entry.file, entry] as const))(
    "%s: read, written and read again they are the same",
    (_file, entry) => {
      const space = loadPublishedSpace(entry);
      const types = new SpaceDataTypes(space);
      const raw: string[] = [];
      let count = 0;
      for (const node of space.own.nodes.values()) {
        if (!hasValueAttributes(node) || !node.value || node.value.xml.trim() === "") continue;
        count++;
        const first = readValue(node.value, types);
        if (!first.ok)
          throw new Error(`${node.key}: ${JSON.stringify(first.problems)} ${node.value.xml.slice(0, 300)}`);
        const again = readValue(writeValue(first.value, types), types);
        expect([node.key, again.ok && again.value]).toEqual([node.key, first.value]);
        raw.push(...listRaw(first.value).map((reason) => `${reason} ${node.key}`));
      }
      expect(raw).toEqual([]);
      total += count;
    },
  );

  it("are as many as the files have Value elements with content", () => {
    const folder = join(
      dirname(createRequire(import.meta.url).resolve("node-opcua-nodesets/package.json")),
      "nodesets",
    );
    const files = PUBLISHED.map((entry) => readFileSync(join(folder, entry.file), "utf8"));
    // Counted in the text itself, without our reader: <Value> of a node opens on a line of its own in every published file.
    const counted = files.reduce((sum, text) => sum + (text.match(/<Value>\s*<(?!\/)/g) ?? []).length, 0);
    const inside = files.reduce(
      (sum, text) => sum + (text.match(/<(?:uax:)?Variant>\s*<(?:uax:)?Value>/g) ?? []).length,
      0,
    );
    expect(total).toBeGreaterThan(counted - inside - 200);
    expect(total).toBeLessThanOrEqual(counted);
    console.log(`${total} values in ${PUBLISHED.length} files`);
  });
});
