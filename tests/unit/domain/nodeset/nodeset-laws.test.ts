/** Laws of reading and writing NodeSet2 files, tried on arbitrary models. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { getValue } from "~/domain/core/result";
import { readPack, writePack } from "~/domain/nodeset/pack";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { describeNodeSetTree, listHeadComments } from "../../../support/describe-nodeset-tree";
import { header, NAMESPACES, nodes } from "../../../support/random-nodeset";

const RUNS = { numRuns: 150 };

describe("any model", () => {
  it("is read as it was written", () => {
    fc.assert(
      fc.property(header, nodes, (head, list) => {
        const { xml, lines } = writeNodeSet({ header: head, nodes: list });
        const again = getValue(readNodeSet(xml));
        expect(again.header).toEqual(head);
        expect(again.nodes).toEqual(list);
        expect([...again.lines].map(([key, place]) => [key, place.line])).toEqual([...lines]);
      }),
      RUNS,
    );
  });

  it("is written the same twice, and after reading", () => {
    fc.assert(
      fc.property(header, nodes, (head, list) => {
        const { xml } = writeNodeSet({ header: head, nodes: list });
        expect(writeNodeSet({ header: head, nodes: [...list].reverse() }).xml).toBe(xml);
        expect(writeNodeSet(getValue(readNodeSet(xml))).xml).toBe(xml);
      }),
      RUNS,
    );
  });

  it("means the same with another order of namespaces", () => {
    fc.assert(
      fc.property(
        header,
        nodes,
        fc.shuffledSubarray(NAMESPACES, { minLength: NAMESPACES.length }),
        (head, list, namespaceUris) => {
          const { xml } = writeNodeSet({ header: { ...head, namespaceUris }, nodes: list });
          expect(getValue(readNodeSet(xml)).nodes).toEqual(list);
        },
      ),
      RUNS,
    );
  });

  it("has one canonical order, whatever order it had", () => {
    fc.assert(
      fc.property(
        header,
        nodes.chain((list) => fc.tuple(fc.constant(list), fc.shuffledSubarray([...list], { minLength: list.length }))),
        (head, [list, shuffled]) => {
          const { xml } = writeNodeSet({ header: head, nodes: list }, { canonicalOrder: true });
          expect(writeNodeSet({ header: head, nodes: shuffled }, { canonicalOrder: true }).xml).toBe(xml);
        },
      ),
      RUNS,
    );
  });

  it("is the same out of a pack", () => {
    fc.assert(
      fc.property(header, nodes, (head, list) => {
        const content = { header: head, nodes: list };
        expect(getValue(readPack(writePack(content)))).toEqual(content);
      }),
      RUNS,
    );
  });

  it("keeps comments, unknown elements and unknown attributes wherever they were strewn", () => {
    const pieces = fc.array(fc.tuple(fc.nat(), fc.constantFrom("comment", "element", "attribute")), { maxLength: 12 });
    fc.assert(
      fc.property(header, nodes, pieces, (head, list, strewn) => {
        const { xml } = writeNodeSet({ header: head, nodes: list });
        const cluttered = strewn.reduce((text, [place, what], i) => strew(text, place, what, i), xml);
        const result = readNodeSet(cluttered);
        expect(result.problems.filter((found) => found.severity === "error")).toEqual([]);
        const again = writeNodeSet(getValue(result)).xml;
        expect(describeNodeSetTree(again)).toEqual(describeNodeSetTree(cluttered));
        expect(listHeadComments(again)).toEqual(listHeadComments(cluttered));
        expect(writeNodeSet(getValue(readNodeSet(again))).xml).toBe(again);
      }),
      RUNS,
    );
  });
});

/** Puts something into the text that no schema knows, before a tag or into one. */
function strew(xml: string, place: number, what: string, number: number): string {
  const isTag = what === "attribute" ? /<[A-Za-z][^<>]*?(?=\s*\/?>)/g : /(?<=>\s*)<[A-Za-z/]/g;
  const body = xml.indexOf("<UANodeSet");
  const tags = [...xml.matchAll(isTag)].filter((tag) => tag.index > body && !xml.startsWith("</UANodeSet", tag.index - 1));
  const tag = tags[place % Math.max(1, tags.length)];
  if (!tag) return xml;
  const at = what === "attribute" ? tag.index + tag[0].length : tag.index;
  const piece = {
    comment: `<!-- ${number} <not a tag> -->`,
    element: `<z:e xmlns:z="urn:z" n="${number}"/>`,
    attribute: ` z${number}="&lt;${number}"`,
  }[what];
  return xml.slice(0, at) + (piece ?? "") + xml.slice(at);
}
