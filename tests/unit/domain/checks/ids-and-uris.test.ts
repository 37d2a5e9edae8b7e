/**
 * No rule looks at names where it should look at ids, or at indices where it should look at URIs: each finds the same on a
 * standard whose types and modelling rules have other names, and with other namespaces before its own in the table.
 */
import { describe, expect, test } from "vitest";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import { isTypeNode, type Node } from "~/domain/address-space/node";
import { standardKey } from "~/domain/address-space/node-id";
import { ExampleModel } from "~/domain/checks/example-model";
import { RULES } from "~/domain/checks/registry";
import type { Example, Rule } from "~/domain/checks/rule";
import { runChecks } from "~/domain/checks/run-checks";
import { readSourceFiles } from "../../../support/source-files";
import { getPublishedLayer, getStandardLayer } from "../../../support/published-layers";

const required = [
  getStandardLayer(),
  ...["Di", "Machinery"].map((name) => getPublishedLayer(`Opc.Ua.${name}.NodeSet2.xml`)),
];

/** Mandatory, Optional, ExposesItsArray, OptionalPlaceholder, MandatoryPlaceholder (OPC 10000-3 §6.4.4.4). */
const MODELLING_RULES = new Set([78, 80, 83, 11508, 11510].map(standardKey));

function rename(layer: Layer): Layer {
  const nodes = [...layer.nodes.values()].map((node): Node => {
    if (!isTypeNode(node) && !MODELLING_RULES.has(node.key)) return node;
    const name = `Q${node.browseName.name.split("").reverse().join("")}`;
    return { ...node, browseName: { ...node.browseName, name }, displayName: [{ text: name }] };
  });
  return buildLayer(layer.header, nodes);
}

const renamed = required.map(rename);

function find(rule: Rule, example: Example, layers: readonly Layer[], first: readonly string[] = []) {
  const model = new ExampleModel();
  example.build(model);
  const { header, nodes } = model.build();
  const own = buildLayer({ ...header, namespaceUris: [...first, ...header.namespaceUris] }, nodes);
  const { wiring } = model;
  const findings = runChecks(AddressSpace.of(layers, own), { rules: [rule], ...(wiring ? { wiring } : {}) });
  return findings.map(({ key, place, severity, attribute }) => ({ key, place, severity, attribute }));
}

describe.each(RULES)("$id", (rule) => {
  test("finds the same where the standard's types have other names", () => {
    for (const example of [rule.examples.bad, rule.examples.good])
      expect(find(rule, example, renamed)).toEqual(find(rule, example, required));
  });

  test("finds the same with other namespaces before its own", () => {
    // These two are about entries that nothing uses or explains: the added ones are findings of their own.
    if (rule.id === "R170" || rule.id === "R173") return;
    const others = ["http://merrow.example/UA/First/", "http://merrow.example/UA/Second/"];
    for (const example of [rule.examples.bad, rule.examples.good])
      expect(find(rule, example, required, others)).toEqual(find(rule, example, required));
  });
});

test("no rule writes a namespace index", () => {
  const wrong = readSourceFiles("app/domain/checks")
    .flatMap(({ path, text }) =>
      (text.split("\n  examples: {")[0] ?? "").split("\n").map((line, i) => ({ at: `${path}:${i + 1}`, line })),
    )
    .filter(({ line }) => /\bns=\d|namespaceIndex/.test(line));
  expect(wrong).toEqual([]);
});
