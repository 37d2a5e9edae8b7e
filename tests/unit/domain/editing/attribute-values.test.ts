/** The quick tests of values say what the schemas say: each was written without the other. */
import { describe, expect, it } from "vitest";
import { isAttributeValue, PLAIN_ATTRIBUTES } from "~/domain/editing/attribute-values";
import { hasAttribute } from "~/domain/editing/attribute-names";
import { attributeSchemas } from "~/domain/editing/node-schema";

const SAMPLES: readonly unknown[] = [
  null,
  true,
  "",
  "text",
  "a\u0000b",
  "Released",
  "Retired",
  "Normal",
  "i=58",
  "nsu=http://example.org/;s=Pump",
  "58",
  0,
  -1,
  1.5,
  65_535,
  65_536,
  4_294_967_295,
  4_294_967_296,
  Number.NaN,
  Number.POSITIVE_INFINITY,
  {},
  [],
  ["a", "b"],
  ["a", 1],
  [{ role: "i=15644", permissions: 1 }],
  [{ role: "i=15644", permissions: -1 }],
  [{ role: "nobody", permissions: 1 }],
  [{ role: "i=15644", permissions: 1, more: true }],
  [{ xml: "<a/>" }],
  [{ xml: "<a>" }],
  [{ xml: "<p:a/>", prefixes: { p: "http://example.org/" } }],
  [{ xml: "<a/>", attributes: { "1x": "no name" } }],
  [{ xml: "<a/>", attributes: { x: "1" } }],
  [{ name: "Speed", description: [{ text: "How fast" }] }],
  [{ name: "Speed", description: [{ text: "How fast", locale: "en" }] }],
  [{ name: "Speed", description: [{ text: "How fast", language: "en" }] }],
  [{ name: "Speed" }],
];

describe("values of attributes that stand for themselves", () => {
  it.each(PLAIN_ATTRIBUTES)("%s", (attribute) => {
    for (const sample of SAMPLES) {
      const wanted = attributeSchemas[attribute].safeParse(sample).success;
      expect([sample, isAttributeValue(attribute, sample)]).toEqual([sample, wanted]);
    }
  });

  it("knows which class has which attribute", () => {
    // OPC 10000-3 §5.5.1, §5.6.2, §5.7, §5.8.3: only Objects and Views notify, only Variables hold values, only ReferenceTypes are symmetric.
    expect(hasAttribute("Object", "eventNotifier")).toBe(true);
    expect(hasAttribute("Variable", "eventNotifier")).toBe(false);
    expect(hasAttribute("ReferenceType", "symmetric")).toBe(true);
    expect(hasAttribute("DataType", "symmetric")).toBe(false);
    expect(hasAttribute("Method", "executable")).toBe(true);
  });
});
