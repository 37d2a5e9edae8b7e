/** Every NodeSet of the npm package node-opcua-nodesets in and out without loss. */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import manifest from "../../nodesets/manifest.json";
import { decodeXmlBytes } from "~/domain/nodeset/decode-xml-bytes";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { getValue } from "~/domain/core/result";
import { getPackageFolder } from "~/library/published.server";
import { validateXsd } from "~/library/validate-xsd.server";
import { describeNodeSetTree, listHeadComments, type NodeSetDescription } from "../support/describe-nodeset-tree";

const folder = getPackageFolder();

describe.each(manifest.nodesets.map(({ file }) => file))("%s", (file) => {
  const bytes = readFileSync(join(folder, file));
  const text = getValue(decodeXmlBytes(bytes));
  const content = getValue(readNodeSet(text));
  const written = writeNodeSet(content);

  it("is read without an error and whole", () => {
    const errors = readNodeSet(text).problems.filter((found) => found.severity === "error");
    expect(errors).toEqual([]);
    expect(content.isWhole).toBe(true);
  });

  it("says after writing what it said before, by a comparer of its own", () => {
    expectSame(describeNodeSetTree(written.xml), describeNodeSetTree(bytes));
    expect(listHeadComments(written.xml)).toEqual(listHeadComments(text));
  });

  it("says the same in canonical order", () => {
    const canonical = writeNodeSet(content, { canonicalOrder: true }).xml;
    expectSame(describeNodeSetTree(canonical), describeNodeSetTree(bytes));
  });

  it("keeps the order of nodes and references", () => {
    const again = getValue(readNodeSet(written.xml));
    expect(again.header).toEqual(content.header);
    expect(again.nodes).toEqual(content.nodes);
  });

  it("changes in one line when one text of one node changes, and leaves the imported file's lines alone", () => {
    const index = Math.floor(content.nodes.length / 2);
    const nodes = content.nodes.map((node, i) =>
      i === index ? { ...node, displayName: [{ text: "Changed here" }, ...node.displayName.slice(1)] } : node,
    );
    const [before, after] = [written.xml, writeNodeSet({ ...content, nodes }).xml].map((xml) => xml.split("\n"));
    const added = content.nodes[index]?.displayName.length === 0 ? 1 : 0;
    expect(after?.length).toBe((before?.length ?? 0) + added);
    expect(after?.filter((line) => line.includes("Changed here"))).toHaveLength(1);
    if (added === 0) expect(after?.filter((line, i) => line !== before?.[i])).toHaveLength(1);
  });

  it("comes out the same when its own output is read and written", () => {
    expect(writeNodeSet(getValue(readNodeSet(written.xml))).xml).toBe(written.xml);
  });

  it("has each node in the line that the writer names", () => {
    const again = getValue(readNodeSet(written.xml));
    expect([...written.lines]).toEqual([...again.lines].map(([key, { line }]) => [key, line]));
  });

  it("has as many nodes as a count of its elements", () => {
    const elements =
      text.match(/<UA(?:Object|Variable|Method|View)(?:Type)?[\s>]|<UA(?:Data|Reference)Type[\s>]/g) ?? [];
    expect(content.nodes).toHaveLength(elements.length);
    expect(new Set(content.nodes.map((node) => node.key)).size).toBe(elements.length);
  });

  it("is valid by the schema after writing", async () => {
    expect(await validateXsd(written.xml)).toEqual([]);
  });
});

/** Compares node by node, so that a failure names the node and not a file of megabytes. */
function expectSame(actual: NodeSetDescription, expected: NodeSetDescription): void {
  expect(actual.namespaces).toEqual(expected.namespaces);
  expect(actual.head).toEqual(expected.head);
  const different = expected.nodes.filter(
    ([id, text], i) => actual.nodes[i]?.[0] !== id || actual.nodes[i]?.[1] !== text,
  );
  const first = different[0];
  if (first) expect(actual.nodes.find(([id]) => id === first[0])?.[1]).toBe(first[1]);
  expect(actual.nodes).toHaveLength(expected.nodes.length);
}
