import { getDataType, getValueRank } from "../../address-space/node";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { argumentList } from "../example-values";
import { findStandardProperty } from "../lookups";
import { setAttribute, notPossible, findSubject } from "../fixes";
import { ok } from "../../core/result";
import { findProperty } from "../../address-space/browse";
import { clause, type NodeRule } from "../rule";
import { findTypeId, findValueRoot, listExtensionObjects } from "../value-xml";

const PROPERTIES = ["InputArguments", "OutputArguments"] as const;

export const r158: NodeRule = {
  id: "R158",
  title: "Argument Properties of Methods",
  severity: "error",
  clause: `${clause(3, "§5.7.1, Table 15, §8.6")}, ${clause(6, "§5.3.1.16")}`,
  priority: 1,
  concerns: ["Method"],
  needs: ["children"],
  condition:
    "InputArguments and OutputArguments of a Method have the DataType Argument and ValueRank 1, and a list of Arguments as value where they have one.",
  why: "Clients build the call from this list; what they cannot read they cannot call.",
  check(node, ctx, report) {
    for (const name of PROPERTIES) {
      const property = findStandardProperty(ctx, node.key, name);
      if (property?.nodeClass !== "Variable") continue;
      const key = ctx.isOwn(property.key) ? property.key : node.key;
      const facts = [
        `DataType: ${ctx.nameOf(getDataType(property))}`,
        `ValueRank: ${String(getValueRank(property)).replace("-", "−")}`,
      ];
      if (getDataType(property) !== D.Argument || getValueRank(property) !== 1) {
        report({
          key: node.key,
          message: `${name} of ${node.browseName.name} is no list of Argument.`,
          facts: [...facts, "Asked for: Argument (i=296), ValueRank 1"],
          data: { property: name },
        });
        continue;
      }
      const root = findValueRoot(property.value);
      const stray = listExtensionObjects(root)
        .map(findTypeId)
        .find((id) => id !== "i=297" && id !== "i=296" && id !== "i=298");
      if (root && root.name === "ListOfExtensionObject" && stray !== undefined) {
        report({
          key,
          attribute: "value",
          message: `${name} of ${node.browseName.name} holds something else than Arguments.`,
          facts: [...facts, `TypeId: ${stray}, asked for i=297`],
        });
      }
    }
  },
  fix: {
    label: "Set DataType Argument and ValueRank 1",
    apply(space, finding) {
      const node = findSubject(space, finding);
      const name = finding.data?.["property"];
      const property = node && typeof name === "string" ? findProperty(space, node.key, name) : undefined;
      if (property?.nodeClass !== "Variable" || !space.isOwn(property.key)) return notPossible(finding);
      return ok([
        setAttribute(property.key, "dataType", D.Argument),
        setAttribute(property.key, "valueRank", 1),
        setAttribute(property.key, "arrayDimensions", "0"),
      ]);
    },
  },
  examples: {
    good: {
      text: "A list of one Argument.",
      build: (m) =>
        m.property("0:InputArguments", {
          parent: m.method("Start", { parent: m.object("Pump1") }),
          dataType: D.Argument,
          valueRank: 1,
          value: argumentList({ name: "Speed", dataType: D.Double }),
        }),
    },
    bad: {
      text: "A single Argument.",
      build: (m) => {
        const start = m.method("Start", { parent: m.object("Pump1") });
        m.property("0:InputArguments", { parent: start, dataType: D.Argument });
        return start;
      },
    },
  },
};
