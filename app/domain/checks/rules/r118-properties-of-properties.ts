import { OPC_UA_NAMESPACE, standardKey } from "../../address-space/node-id";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { ofType } from "../lookups";
import { clause, type NodeRule } from "../rule";

const ONLY_DATA_VARIABLES = new Set(["NodeVersion", "LocalTime", "AllowNulls"]);

export const r118: NodeRule = {
  id: "R118",
  title: "NodeVersion, LocalTime and AllowNulls not on Properties",
  severity: "error",
  clause: clause(3, "§5.6.2, Table 13"),
  priority: 2,
  concerns: ["Variable"],
  needs: ["children", "property"],
  condition: "A Property does not carry NodeVersion, LocalTime or AllowNulls.",
  why: "They describe DataVariables; on a Property nobody looks for them.",
  check(node, ctx, report) {
    for (const { target, source, type } of ofType(ctx, ctx.childEdges(node.key), R.HasProperty)) {
      const child = ctx.node(target);
      if (child?.browseName.namespaceUri !== OPC_UA_NAMESPACE || !ONLY_DATA_VARIABLES.has(child.browseName.name))
        continue;
      report({
        message: `The Property ${node.browseName.name} carries ${child.browseName.name}.`,
        facts: [`HasProperty to ${ctx.describe(target)}`, "Allowed on DataVariables only"],
        data: { source, type, target },
      });
    }
  },
  examples: {
    good: {
      text: "On a DataVariable.",
      build: (m) =>
        m.property("0:LocalTime", { parent: m.variable("Speed", { parent: m.object("Pump1") }), dataType: TIME_ZONE }),
    },
    bad: {
      text: "On a Property.",
      build: (m) => {
        const label = m.property("Label", { parent: m.object("Pump1") });
        m.property("0:LocalTime", { parent: label, dataType: TIME_ZONE });
        return label;
      },
    },
  },
};

/** TimeZoneDataType. */
const TIME_ZONE = standardKey(8912);
