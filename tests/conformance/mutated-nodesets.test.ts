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
    let refused = 0;
    const disagreements: string[] = [];
    for (let i = 0; i < TRIES; i++) {
      const input = damage(random);
      const start = performance.now();
      const result = read(input);
      slowest = Math.max(slowest, performance.now() - start);
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
    console.log(`${name}: ${TRIES} files, ${refused} refused, slowest ${slowest.toFixed(0)} ms`);
    expect(disagreements).toEqual([]);
  });
});

describe("hostile files", () => {
  const root = text.slice(0, text.indexOf(">", text.indexOf("<UANodeSet")) + 1);

  it.each([
    ["depth 100 000", () => Buffer.from(root + "<a>".repeat(100_000)), "limit.depth"],
    [
      "three million attributes",
      () => Buffer.from(`${root}<a${Array.from({ length: 3_000_000 }, (_, i) => ` a${i}=""`).join("")}`),
      "limit.attributes",
    ],
    [
      "ten million attributes of one name",
      () => Buffer.concat([Buffer.from(`${root}<a`), Buffer.alloc(40_000_000, ' a=""')]),
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
    ["NUL bytes", () => Buffer.concat([Buffer.from(root), Buffer.alloc(1_000)]), "xml.not-well-formed"],
    ["nothing but NUL", () => Buffer.alloc(1_000), "file.other-kind"],
  ])("%s is refused within bounds", (name, make, code) => {
    const input = make();
    const start = performance.now();
    const result = read(input);
    const time = performance.now() - start;
    console.log(
      `${name}: ${time.toFixed(0)} ms, ${result.problems
        .map((found) => found.code)
        .slice(0, 3)
        .join(", ")}`,
    );
    expect(result.problems.map((found) => found.code)).toContain(code);
    expectDecent(result);
  });
});
