/**
 * Files that were damaged on purpose: the reader answers within bounds of time and memory, with a place, and finds broken
 * what libxml2 (a parser that this project did not write) finds broken.
 */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { XmlDocument, XmlParseError } from "libxml2-wasm";
import { describe, expect, it } from "vitest";
import type { Problem } from "~/domain/core/result";
import { formatProblem } from "~/domain/core/problem-texts";
import { decodeXmlBytes } from "~/domain/nodeset/decode-xml-bytes";
import type { NodeSetContent } from "~/domain/nodeset/nodeset-content";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { fail, ok, type Result } from "~/domain/core/result";
import { getPackageFolder } from "~/library/published.server";
import { makeRandom, type Random } from "../support/random";

const bytes = readFileSync(join(getPackageFolder(), "Opc.Ua.IOLink.NodeSet2.xml"));
const text = bytes.toString("utf8");

/** Heap in MB, garbage included: what a read asked of the process at most. */
const heapMb = (): number => process.memoryUsage().heapUsed / 1024 / 1024;

type Measured = { readonly result: Result<NodeSetContent>; readonly time: number; readonly memory: number };

function measure(input: Uint8Array): Measured {
  const before = heapMb();
  const start = performance.now();
  const result = read(input);
  return { result, time: performance.now() - start, memory: Math.max(0, heapMb() - before) };
}

/** Without a clock: how long each took is printed, and only the suite's own time-out ends a read that hangs. */
function read(input: Uint8Array): Result<NodeSetContent> {
  const decoded = decodeXmlBytes(input);
  if (!decoded.ok) return decoded;
  const result = readNodeSet(decoded.value);
  const problems = [...decoded.problems, ...result.problems];
  return result.ok ? ok(result.value, problems) : fail(...problems);
}

/** Every problem has a place and a text; a failure says why; what was read can be written. */
function expectDecent(result: Result<NodeSetContent>): void {
  for (const found of result.problems) {
    if (found.code === "limit.problems" || found.code === "limit.file-size") continue;
    expect(found.at?.line, found.code).toBeGreaterThan(0);
    expect(found.at?.column, found.code).toBeGreaterThan(0);
    expect(formatProblem(found)).not.toBe(found.code);
  }
  if (result.ok) expect(read(Buffer.from(writeNodeSet(result.value).xml)).ok).toBe(true);
  else expect(result.problems.some((found) => found.severity === "error")).toBe(true);
}

const WELL_FORMEDNESS = new Set(["xml.not-well-formed", "xml.truncated", "xml.not-xml", "xml.prefix-undeclared"]);

function isBrokenByLibxml(input: Uint8Array): boolean {
  try {
    XmlDocument.fromBuffer(input).dispose();
    return false;
  } catch (error) {
    // A namespace name that is no URI is a remark of libxml2, not a fault of form (Namespaces in XML 1.0 §2.2).
    if (error instanceof XmlParseError) return !/^\S+ '[^']*' is not a valid URI$/.test(error.message.trim());
    throw error;
  }
}

const isBrokenByUs = (problems: readonly Problem[]): boolean => problems.some(({ code }) => WELL_FORMEDNESS.has(code));

const randomByte = (random: Random): number => random.below(256);

function splice(at: number, drop: number, insert: Uint8Array | string = ""): Buffer {
  return Buffer.concat([bytes.subarray(0, at), Buffer.from(insert), bytes.subarray(at + drop)]);
}

/** Each answers a damaged copy of the file; all are tried many times with different numbers. */
const damages: Readonly<Record<string, (random: Random) => Uint8Array>> = {
  "one byte changed": (random) => splice(random.below(bytes.length), 1, Uint8Array.of(randomByte(random))),
  "eight bytes changed": (random) => {
    const copy = Buffer.from(bytes);
    for (let i = 0; i < 8; i++) copy[random.below(copy.length)] = randomByte(random);
    return copy;
  },
  "a piece dropped": (random) => splice(random.below(bytes.length), random.below(200)),
  "a piece doubled": (random) => {
    const at = random.below(bytes.length);
    return splice(at, 0, bytes.subarray(at, at + random.below(200)));
  },
  "cut off": (random) => bytes.subarray(0, random.below(bytes.length)),
  "markup inserted": (random) => {
    const pieces = [
      "<",
      ">",
      "&",
      '"',
      "'",
      "]]>",
      "<!--",
      "-->",
      "<![CDATA[",
      "</",
      "/>",
      "<a>",
      "&#0;",
      "&x;",
      "\0",
      "<?",
      "<!",
      "=",
    ];
    return splice(random.below(bytes.length), 0, pieces[random.below(pieces.length)] ?? "");
  },
  "an element dropped": (random) => {
    const tags = [...text.matchAll(/<(\w+)[^<>]*\/>|<(\w+)[^<>]*>[^<]*<\/\2>/g)];
    const tag = tags[random.below(tags.length)];
    return Buffer.from(tag ? text.slice(0, tag.index) + text.slice(tag.index + tag[0].length) : text);
  },
  "an attribute dropped": (random) => {
    const attributes = [...text.matchAll(/ \w+="[^"]*"/g)];
    const attribute = attributes[random.below(attributes.length)];
    return Buffer.from(
      attribute ? text.slice(0, attribute.index) + text.slice(attribute.index + attribute[0].length) : text,
    );
  },
};

const TRIES = 45;

describe.each(Object.entries(damages))("%s", (name, damage) => {
  it(`is met decently ${TRIES} times`, () => {
    const random = makeRandom(name);
    let slowest = 0;
    let largest = 0;
    let refused = 0;
    const disagreements: string[] = [];
    for (let i = 0; i < TRIES; i++) {
      const input = damage(random);
      const { result, time, memory } = measure(input);
      slowest = Math.max(slowest, time);
      largest = Math.max(largest, memory);
      if (!result.ok) refused++;
      expectDecent(result);
      const isDecoded = !result.problems.some(({ code }) => code.startsWith("encoding.") || code.startsWith("file."));
      // A document type is refused by us for another reason, before the rest is looked at.
      if (!isDecoded || result.problems.some(({ code }) => code === "xml.doctype" || code.startsWith("nodeset.wrong")))
        continue;
      if (isBrokenByUs(result.problems) !== isBrokenByLibxml(input)) {
        disagreements.push(
          `try ${i}: ${result.problems.map((one) => `${formatProblem(one)} ${JSON.stringify(one.at)}`).join(" | ")}`,
        );
      }
    }
    console.log(
      `${name}: ${TRIES} files, ${refused} refused, slowest ${slowest.toFixed(0)} ms, at most ${largest.toFixed(0)} MB`,
    );
    expect(disagreements).toEqual([]);
  });
});

describe("hostile files", () => {
  const root = text.slice(0, text.indexOf(">", text.indexOf("<UANodeSet")) + 1);

  /** The first have names of their own; more than so many of these do not fit into a file that is not refused by its size. */
  const makeAttributes = (count: number): Buffer => {
    const different = Array.from({ length: 1_000 }, (_, i) => ` a${i}=""`).join("");
    return Buffer.concat([Buffer.from(`${root}<a${different}`), Buffer.alloc(count * 5, ' a=""')]);
  };

  it.each([
    ["depth 100 000", () => Buffer.from(root + "<a>".repeat(100_000)), "limit.depth"],
    ["ten million attributes", () => makeAttributes(10_000_000), "limit.file-size"],
    ["nine million attributes", () => makeAttributes(9_000_000), "limit.attributes"],
    [
      "nine million attributes of one name",
      () => Buffer.concat([Buffer.from(`${root}<a`), Buffer.alloc(45_000_000, ' a=""')]),
      "xml.not-well-formed",
    ],
    ["one attribute of 40 MB", () => Buffer.from(`${root}<a b="${"x".repeat(40_000_000)}`), "xml.truncated"],
    [
      "40 MB of text",
      () => Buffer.from(`${root}<UAObject NodeId="ns=1;i=1" BrowseName="1:A"><Documentation>${"x".repeat(40_000_000)}`),
      "xml.truncated",
    ],
    [
      "40 MB of ampersands",
      () => Buffer.from(`${root}<UAObject NodeId="ns=1;i=1" BrowseName="1:A"><Documentation>${"&".repeat(40_000_000)}`),
      "xml.not-well-formed",
    ],
    ["a million references", () => Buffer.from(`${root}<a>${"&amp;".repeat(1_000_000)}`), "xml.truncated"],
    ["a comment of 40 MB", () => Buffer.from(`<!--${"-x".repeat(20_000_000)}`), "xml.truncated"],
    ["two million empty elements", () => Buffer.from(`${root}${"<a/>".repeat(2_000_000)}`), "xml.truncated"],
    [
      "entities that grow",
      () => Buffer.from(`<!DOCTYPE a [<!ENTITY a "aaaaaaaaaa">${"<!ENTITY b '&a;&a;&a;'>".repeat(1_000)}]><a>&b;</a>`),
      "xml.doctype",
    ],
    [
      "600 000 nodes",
      () =>
        Buffer.from(
          root + Array.from({ length: 600_000 }, (_, i) => `<UAView NodeId="i=${i + 1}" BrowseName="A"/>`).join(""),
        ),
      "limit.nodes",
    ],
    [
      "200 000 aliases in one chain",
      () =>
        Buffer.from(
          `${root}<Aliases>${Array.from({ length: 200_000 }, (_, i) => `<Alias Alias="${i}">${i + 1}</Alias>`).join("")}</Aliases></UANodeSet>`,
        ),
      "nodeset.alias-unknown",
    ],
    [
      "a million comments in one table",
      () => Buffer.from(`${root}<Aliases>${"<!--x-->".repeat(1_000_000)}</Aliases>`),
      "xml.truncated",
    ],
    [
      "300 000 references with a comment each",
      () => {
        const row = '<!--x--><Reference ReferenceType="i=47" x="1">ns=1;i=2</Reference>';
        const node = `<UAObject NodeId="ns=1;i=1" BrowseName="1:A"><References>${row.repeat(300_000)}`;
        return Buffer.from(root + node);
      },
      "xml.truncated",
    ],
    [
      "300 000 fields of one name with unknown elements",
      () => {
        const field = '<Field Name="A"><!--x--><DisplayName x="1">a<b/></DisplayName></Field>';
        const node = '<UADataType NodeId="ns=1;i=1" BrowseName="1:A"><Definition Name="1:A">';
        return Buffer.from(root + node + field.repeat(300_000));
      },
      "xml.truncated",
    ],
    [
      "100 000 required models within each other",
      () => Buffer.from(`${root}<Models>${'<Model ModelUri="a">'}${'<RequiredModel ModelUri="a">'.repeat(100_000)}`),
      "limit.depth",
    ],
    [
      "an entity of a file",
      () => Buffer.from('<!DOCTYPE a [<!ENTITY a SYSTEM "file:///etc/hostname">]><a>&a;</a>'),
      "xml.doctype",
    ],
    [
      "an entity of the network",
      () => Buffer.from('<!DOCTYPE a SYSTEM "http://127.0.0.1:9/a.dtd"><a/>'),
      "xml.doctype",
    ],
    [
      "an entity that nobody declared",
      () => Buffer.from(text.replace("<DisplayName>", "<DisplayName>&nbsp;")),
      "xml.not-well-formed",
    ],
    [
      "UTF-16 cut in half a character",
      () => Buffer.from(`\uFEFF${text}`, "utf16le").subarray(0, 100_001),
      "encoding.invalid",
    ],
    [
      "Latin 1 that calls itself UTF-8",
      () => Buffer.from(text.replace("<DisplayName>", "<DisplayName>ä"), "latin1"),
      "encoding.invalid",
    ],
    [
      "an encoding that nobody knows",
      () => Buffer.from(text.replace('encoding="utf-8"', 'encoding="x-none"')),
      "encoding.unknown",
    ],
    ["a mark in the middle", () => Buffer.from(text.replace("<UANodeSet", "\uFEFF<UANodeSet")), "xml.not-xml"],
    ["NUL bytes", () => Buffer.concat([Buffer.from(root), Buffer.alloc(1_000)]), "xml.not-well-formed"],
    ["nothing but NUL", () => Buffer.alloc(1_000), "file.other-kind"],
  ])("%s is refused within bounds", (name, make, code) => {
    const input = make();
    const { result, time, memory } = measure(input);
    console.log(
      `${name} (${(input.length / 1e6).toFixed(1)} MB): ${time.toFixed(0)} ms, ${memory.toFixed(0)} MB, ${result.problems
        .map((found) => found.code)
        .slice(0, 3)
        .join(", ")}`,
    );
    expect(result.problems.map((found) => found.code)).toContain(code);
    expectDecent(result);
  });

  it.each([
    ["UTF-8 with its mark", () => Buffer.from(`\uFEFF${text}`)],
    [
      "UTF-16, little end first",
      () => Buffer.from(`\uFEFF${text.replace('encoding="utf-8"', 'encoding="utf-16"')}`, "utf16le"),
    ],
    [
      "UTF-16, big end first",
      () => Buffer.from(`\uFEFF${text.replace('encoding="utf-8"', 'encoding="utf-16"')}`, "utf16le").swap16(),
    ],
    ["UTF-16 without its mark", () => Buffer.from(text, "utf16le")],
    ["UTF-8 that calls itself UTF-16", () => Buffer.from(text.replace('encoding="utf-8"', 'encoding="utf-16"'))],
    ["CR LF", () => Buffer.from(text.replace(/\r?\n/g, "\r\n"))],
  ])("%s is read as what it is", (name, make) => {
    const { result, time, memory } = measure(make());
    console.log(
      `${name}: ${time.toFixed(0)} ms, ${memory.toFixed(0)} MB, ${result.problems.map((found) => found.code).join(", ")}`,
    );
    expect(result.problems.filter((found) => found.severity === "error")).toEqual([]);
    const plain = read(bytes);
    if (!result.ok || !plain.ok) throw new Error("Not read");
    expect(writeNodeSet(result.value).xml).toBe(writeNodeSet(plain.value).xml);
  });

  it("have no more than 256 attributes at one element, were they let in by their size", () => {
    const hostile = makeAttributes(10_000_000).toString();
    const before = heapMb();
    const start = performance.now();
    const result = readNodeSet(hostile, { limits: { maxBytes: hostile.length } });
    console.log(
      `ten million attributes: ${(performance.now() - start).toFixed(0)} ms, ${(heapMb() - before).toFixed(0)} MB`,
    );
    expect(result.problems.map((found) => [found.code, found.at?.line !== undefined])).toEqual([
      ["limit.attributes", true],
    ]);
  });
});
