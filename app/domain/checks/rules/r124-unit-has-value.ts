import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import { CELSIUS } from "../example-values";
import { clause, type NodeRule } from "../rule";
import { listUnits } from "../unit-values";

export const r124: NodeRule = {
  id: "R124",
  title: "EngineeringUnits has a value",
  severity: "warning",
  clause: `${clause(8, "§5.6.3.3, Table 19")}, ${clause(6, "§F.8")}`,
  priority: 1,
  concerns: ["Variable"],
  standardNames: ["EngineeringUnits"],
  needs: ["property", "no type above"],
  condition:
    "On an instance EngineeringUnits has a value with namespaceUri, unitId and displayName; an empty description is a hint. Declarations need none.",
  why: "A server answers “no value”, and the number stays without its unit.",
  check(node, ctx, report) {
    if (node.nodeClass !== "Variable") return;
    const owner = ctx.parentEdges(node.key)[0];
    const name = owner === undefined ? "its owner" : ctx.nameOf(owner.source);
    const [value] = listUnits(node.value);
    if (!value) {
      report({
        attribute: "value",
        message: `The EngineeringUnits of ${name} has no value.`,
        facts: ["Value: none with an EUInformation"],
      });
      return;
    }
    const missing = [
      ...(value.uri === "" ? ["namespaceUri"] : []),
      ...(value.unitId === "" ? ["unitId"] : []),
      ...(value.symbol === "" ? ["displayName"] : []),
    ];
    const facts = [
      `NamespaceUri: ${value.uri || "none"}`,
      `UnitId: ${value.unitId || "none"}`,
      `DisplayName: ${value.symbol || "none"}`,
      `Description: ${value.name || "none"}`,
    ];
    if (missing.length > 0)
      report({ attribute: "value", message: `The unit of ${name} has no ${missing.join(", ")}.`, facts });
    else if (value.name === "")
      report({ severity: "hint", attribute: "value", message: `The unit of ${name} has no description.`, facts });
  },
  examples: {
    good: {
      text: "All of it.",
      build: (m) =>
        m.property("0:EngineeringUnits", {
          parent: m.variable("T", { parent: m.object("Tank1"), type: T.AnalogUnitType }),
          dataType: D.EUInformation,
          value: CELSIUS,
        }),
    },
    bad: {
      text: "No value.",
      build: (m) =>
        m.property("0:EngineeringUnits", {
          parent: m.variable("T", { parent: m.object("Tank1"), type: T.AnalogUnitType }),
          dataType: D.EUInformation,
        }),
    },
  },
};
