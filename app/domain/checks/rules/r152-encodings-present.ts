import { toNodeKey } from "../../address-space/node-id";
import { OPC_UA_NAMESPACE } from "../../address-space/node-id";
import type { ObjectNode } from "../../address-space/node";
import { StandardDataType as D, StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { findSubject, notPossible } from "../fixes";
import { ok } from "../../core/result";
import type { Operation } from "../../editing/operation";
import { clause, type NodeRule } from "../rule";
import { addStructure, isConcreteStructure } from "../structures";

const ENCODINGS = [
  ["Default Binary", "DefaultBinary"],
  ["Default XML", "DefaultXml"],
  ["Default JSON", "DefaultJson"],
] as const;

export const r152: NodeRule = {
  id: "R152",
  title: "A concrete Structure has its encodings",
  severity: "error",
  clause: `${clause(3, "§5.8.3, Table 16")}, ${clause(6, "§5.1.7")}`,
  priority: 1,
  concerns: ["DataType"],
  condition:
    "Every Structure and Union that is not abstract has “Default Binary” or “Default XML” of namespace 0, each once; a missing one of the three is a hint.",
  why: "The encoding's NodeId is how a value says what it is: without one no value can be sent.",
  check(node, ctx, report) {
    if (!isConcreteStructure(node, ctx)) return;
    const names = ctx
      .otherEdges(node.key)
      .filter((e) => e.type === R.HasEncoding)
      .flatMap((e) => {
        const encoding = ctx.node(e.target);
        return encoding ? [encoding.browseName] : [];
      });
    const standard = names.filter((n) => n.namespaceUri === OPC_UA_NAMESPACE).map((n) => n.name);
    const facts = [`HasEncoding: ${names.map((n) => n.name).join(", ") || "none"}`];
    const name = node.browseName.name;
    const twice = standard.find((n, i) => standard.indexOf(n) !== i);
    const missing = ENCODINGS.map(([n]) => n).filter((n) => !standard.includes(n));
    if (twice !== undefined)
      report({ attribute: "references", message: `${name} has the encoding ${twice} twice.`, facts });
    if (missing.includes("Default Binary") && missing.includes("Default XML"))
      report({ attribute: "references", message: `${name} has neither a binary nor an XML encoding.`, facts });
    else if (missing.length > 0)
      report({
        severity: "hint",
        attribute: "references",
        message: `${name} has no encoding ${missing.join(", ")}.`,
        facts,
      });
  },
  fix: {
    label: "Make the missing encodings",
    apply(space, finding, ids) {
      const node = findSubject(space, finding);
      if (!node) return notPossible(finding);
      const present = space
        .edgesFrom(node.key)
        .filter((e) => e.type === R.HasEncoding)
        .map((e) => space.getNode(e.target)?.browseName.name);
      const operations: Operation[] = [];
      for (const [name, symbolicName] of ENCODINGS) {
        if (present.includes(name)) continue;
        const allocated = ids.allocate("Object");
        if (!allocated.ok) return allocated;
        const encoding: ObjectNode = {
          key: toNodeKey(allocated.value),
          nodeId: allocated.value,
          nodeClass: "Object",
          order: space.own.nextOrder + operations.length,
          browseName: { namespaceUri: OPC_UA_NAMESPACE, name },
          symbolicName,
          displayName: [{ text: name }],
          references: [
            { type: R.HasEncoding, target: node.key, isForward: false },
            { type: R.HasTypeDefinition, target: T.DataTypeEncodingType, isForward: true },
          ],
        };
        operations.push({ kind: "addNode", node: encoding });
      }
      return operations.length > 0 ? ok(operations) : notPossible(finding);
    },
  },
  examples: {
    good: {
      text: "All three.",
      build: (m) => addStructure(m, "RecipeDataType", [{ name: "Speed", dataType: D.Double }]),
    },
    bad: {
      text: "None.",
      build: (m) => m.dataType("RecipeDataType", { definition: { fields: [{ name: "Speed", dataType: D.Double }] } }),
    },
  },
};
