/** Files of our own for what the schema allows, or readers must bear, and no published NodeSet contains. */
import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { getValue } from "~/domain/core/result";
import type { Node } from "~/domain/address-space/node";
import type { NodeSetContent } from "~/domain/nodeset/nodeset-content";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { readPack, writePack } from "~/domain/nodeset/pack";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { validateXsd } from "~/library/validate-xsd.server";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { applyOperations } from "~/domain/editing/apply-operation";
import { applyWithInverse } from "~/domain/editing/invert-operation";
import type { Operation } from "~/domain/editing/operation";
import { operationsSchema } from "~/domain/editing/operation-schema";
import { describeNodeSetTree, listHeadComments } from "../support/describe-nodeset-tree";
import { getPublishedLayer } from "../support/published-layers";

function load(name: string): string {
  return readFileSync(new URL(`../fixtures/nodesets/${name}.NodeSet2.xml`, import.meta.url), "utf8");
}

function nodeNamed(content: NodeSetContent, name: string): Node {
  const node = content.nodes.find((one) => one.browseName.name === name);
  if (!node) throw new Error(`No node ${name}`);
  return node;
}

describe.each(["rare", "strange", "cluttered"])("the %s file", (name) => {
  const text = load(name);
  const content = getValue(readNodeSet(text));
  const { xml } = writeNodeSet(content);

  it("says after writing what it said before, by a comparer of its own", () => {
    expect(describeNodeSetTree(xml)).toEqual(describeNodeSetTree(text));
    expect(listHeadComments(xml)).toEqual(listHeadComments(text));
  });

  it("comes out the same when its own output is read and written", () => {
    const again = getValue(readNodeSet(xml));
    expect(writeNodeSet(again).xml).toBe(xml);
    expect({ header: again.header, nodes: again.nodes }).toEqual({ header: content.header, nodes: content.nodes });
  });

  it("survives a pack", () => {
    const pack = getValue(readPack(writePack(content)));
    expect(writeNodeSet(pack).xml).toBe(xml);
  });
});

describe("the rare file", () => {
  const text = load("rare");
  const content = getValue(readNodeSet(text));

  it("is valid by the schema before and after", async () => {
    expect(await validateXsd(text)).toEqual([]);
    expect(await validateXsd(writeNodeSet(content).xml)).toEqual([]);
  });

  it("is read without a problem but the name that looks as if it had two indices", () => {
    expect(readNodeSet(text).problems.map(({ code }) => code)).toEqual(["nodeset.browse-name-prefix"]);
  });

  it("keeps dates, locales and unused namespaces as written", () => {
    expect(content.header.lastModified).toBe("2026-01-02T03:04:05.6789+02:00");
    expect(content.header.models[0]?.requiredModels[1]?.publicationDate).toBe("2022-11-03T00:00:00.0000000");
    expect(content.header.namespaceUris[0]).toBe("http://merrow.example/unused/");
    expect(nodeNamed(content, "Rare").displayName.map(({ locale }) => locale)).toEqual([undefined, "de-DE", ""]);
  });

  it("knows targets on other servers by their URI", () => {
    const servers = nodeNamed(content, "Rare").references.map((reference) => reference.serverUri);
    expect(servers).toEqual([undefined, "urn:merrow:plc", "urn:merrow:scada", undefined, undefined, undefined]);
  });

  it("replaces indices in values by URIs, and nothing else", () => {
    const node = nodeNamed(content, "1:Odd");
    const xml = "value" in node ? node.value?.xml : undefined;
    expect(xml).toContain("<uax:Identifier>nsu=http://merrow.example/rare/;s=a=b;c</uax:Identifier>");
    expect(xml).toContain("<uax:Identifier>svr=1;nsu=http://merrow.example/a%3Bb%25c/;i=77</uax:Identifier>");
    expect(xml).toContain(
      "<uax:NamespaceIndex>http://opcfoundation.org/UA/DI/</uax:NamespaceIndex><uax:Name>2:Name</uax:Name>",
    );
    expect(xml).toContain("<uax:NamespaceIndex>0</uax:NamespaceIndex>");
    expect(xml).toContain("<uax:NamespaceIndex>5</uax:NamespaceIndex></free>");
  });

  it("keeps duplicate references, since the file has them", () => {
    expect(nodeNamed(content, "Owner").references).toHaveLength(3);
  });

  it("gives a new namespace the next index, and leaves the others", () => {
    const [first, ...rest] = content.nodes;
    if (!first) throw new Error("No nodes");
    const added = { ...first, browseName: { namespaceUri: "http://merrow.example/new/", name: "New" } };
    const again = getValue(readNodeSet(writeNodeSet({ ...content, nodes: [added, ...rest] }).xml));
    expect(again.header.namespaceUris).toEqual([...content.header.namespaceUris, "http://merrow.example/new/"]);
    expect(again.nodes.slice(1)).toEqual(rest);
    expect(again.nodes[0]?.browseName).toEqual(added.browseName);
  });
});

describe("the strange file", () => {
  it("is read with its tables behind the nodes", () => {
    const result = readNodeSet(load("strange"));
    expect(result.problems.map(({ code, severity }) => `${severity} ${code}`)).toEqual(["hint nodeset.header-order"]);
    const content = getValue(result);
    expect(content.isWhole).toBe(true);
    expect(nodeNamed(content, "Own").key).toBe("nsu=http://merrow.example/strange/;i=1");
  });
});

describe("the cluttered file", () => {
  const text = load("cluttered");
  const content = getValue(readNodeSet(text));
  const required = getPublishedLayer("Opc.Ua.NodeSet2.xml");

  it("loses nothing and says nothing", () => {
    expect(content.isWhole).toBe(true);
    expect(readNodeSet(text).problems).toEqual([]);
    const count = (xml: string, what: RegExp): number => xml.match(what)?.length ?? 0;
    const { xml } = writeNodeSet(content);
    for (const what of [/<!--/g, / x:\w+="/g, /<x:\w+/g, /<\?keeper/g, /stray text &amp; more/g]) {
      expect(count(xml, what)).toBe(count(text, what));
    }
  });

  it("writes booleans and numbers as they stood, until an edit changes them", () => {
    const { xml } = writeNodeSet(content);
    for (const piece of ['WriteMask="007"', 'IsForward="true"', 'IsForward="0"', "1000.0", 'Historizing="0"', 'AccessRestrictions="03"'])
      expect(xml).toContain(piece);
    expect(nodeNamed(content, "Spelled")).toMatchObject({ writeMask: 7, hasNoPermissions: true, eventNotifier: 1 });
    const space = AddressSpace.of([required], buildLayer(content.header, content.nodes));
    const key = nodeNamed(content, "Slow").key;
    const faster: Operation = { kind: "setAttribute", key, attribute: "minimumSamplingInterval", value: 10 };
    const never: Operation = { kind: "setAttribute", key, attribute: "historizing" };
    const edited = getValue(applyOperations(space, [faster, never]));
    const after = writeNodeSet({ header: edited.own.header, nodes: edited.listOwnNodes() }).xml;
    expect(after).toContain('BrowseName="1:Slow" ValueRank="-01" MinimumSamplingInterval="10"');
    expect(after).not.toContain("Historizing");
  });

  it("gives the same bytes after an edit was undone, and after a node was deleted and came back", () => {
    const space = AddressSpace.of([required], buildLayer(content.header, content.nodes));
    const owner = nodeNamed(content, "Owner");
    const rename: Operation = { kind: "setAttribute", key: owner.key, attribute: "displayName", value: [{ text: "New" }] };
    const speed: Operation = { kind: "removeNode", key: nodeNamed(content, "Speed").key };
    const type: Operation = { kind: "removeReference", source: owner.key, type: "i=40" as NodeKey, target: "i=58" as NodeKey };
    const edited = getValue(applyWithInverse(space, [rename, speed, type]));
    const back = getValue(applyOperations(edited.space, operationsSchema.parse(edited.inverse)));
    expect(writeNodeSet({ header: back.own.header, nodes: back.listOwnNodes() }).xml).toBe(writeNodeSet(content).xml);
  });

  it("keeps comments at their references when others go", () => {
    const space = AddressSpace.of([required], buildLayer(content.header, content.nodes));
    const [owner, method] = [nodeNamed(content, "Owner").key, nodeNamed(content, "Do").key];
    const remove: Operation = { kind: "removeReference", source: owner, type: "i=47" as NodeKey, target: method };
    const edited = getValue(applyOperations(space, [remove]));
    const { xml } = writeNodeSet({ header: edited.own.header, nodes: edited.listOwnNodes() });
    expect(xml).toContain('<!-- its type -->\n      <Reference ReferenceType="HasTypeDefinition" x:why="because">');
    expect(xml).not.toContain("<!-- once more -->");
  });

  it.each([
    [' x:own="true"', ""],
    ['x:voice="tenor"', 'x:voice="alt"'],
    ["<!-- once more -->", ""],
    ["<!-- BaseObjectType -->", ""],
    ["<!-- behind the file -->", ""],
    ["<!-- end of the file -->", ""],
    ["<!-- the other one -->", ""],
    ["free for all", "free for some"],
    ["<x:NoRole />", ""],
    ['x:table="aliases"', ""],
    ['x:page="7"', 'x:page="8"'],
    ["<x:Emphasis>much</x:Emphasis>", ""],
    ["stray text", "text"],
    ["<!-- metres -->", ""],
  ])("is not called the same by the comparer when %j becomes %j", (before, after) => {
    expect(text).toContain(before);
    expect(describeNodeSetTree(text.replace(before, after))).not.toEqual(describeNodeSetTree(text));
  });
});

describe("the comparer", () => {
  const text = load("rare");

  it.each([
    ['Version="0.1 alpha"', 'Version="0.1 beta"'],
    ['WriteMask="4294967295"', ""],
    ["<DisplayName>Rare</DisplayName>", "<DisplayName>Rarer</DisplayName>"],
    ['Locale=""', ""],
    ["svr=1;i=85", "i=85"],
    ['IsForward="false">i=87', ">i=87"],
    ['<Reference ReferenceType="HasComponent">ns=3;i=6001</Reference>', ""],
    ["<Category>Rare Unit B</Category>", ""],
    ['MaxStringLength="32"', 'MaxStringLength="33"'],
    ["<uax:Int32>2</uax:Int32>", "<uax:Int32>3</uax:Int32>"],
    ["  kept  as it stands  ", "kept as it stands"],
    ['<Text Locale="fr">un</Text>', ""],
    ["<Name>Length</Name>", "<Name>length</Name>"],
    ["ns=3;s=a=b;c", "ns=2;s=a=b;c"],
    ["<uax:NamespaceIndex>2", "<uax:NamespaceIndex>3"],
    ['Permissions="131071"', 'Permissions="1"'],
    ["<![CDATA[<raw>]]>", "raw"],
  ])("sees that %j became %j", (before, after) => {
    expect(text).toContain(before);
    expect(describeNodeSetTree(text.replace(before, after))).not.toEqual(describeNodeSetTree(text));
  });

  it("does not mind other prefixes, or the order of nodes and namespaces", () => {
    const first = text.slice(text.indexOf("  <UAView"), text.indexOf("  <UAReferenceType"));
    expect(describeNodeSetTree(text.replace(first, "").replace("</UANodeSet>", `${first}</UANodeSet>`))).toEqual(
      describeNodeSetTree(text),
    );
    expect(describeNodeSetTree(text.replaceAll("uax:", "other:").replace("xmlns:uax", "xmlns:other"))).toEqual(
      describeNodeSetTree(text),
    );
    const swapped = text
      .replace("<Uri>http://merrow.example/unused/</Uri>", "<Uri>X</Uri>")
      .replace("<Uri>http://merrow.example/rare/</Uri>", "<Uri>http://merrow.example/unused/</Uri>")
      .replace("<Uri>X</Uri>", "<Uri>http://merrow.example/rare/</Uri>")
      .replaceAll("ns=3;", "ns=1;")
      .replaceAll(/(BrowseName|Definition Name)="3:/g, '$1="1:');
    expect(describeNodeSetTree(swapped)).toEqual(describeNodeSetTree(text));
  });
});
