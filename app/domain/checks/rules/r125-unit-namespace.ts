import { attributeFix } from "../fixes";
import { hasValueAttributes } from "../../address-space/node";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import { CELSIUS, unit, UNECE_URI } from "../example-values";
import { clause, type NodeRule } from "../rule";
import { IEC_URI, isNearMiss, listUnits } from "../unit-values";

export const r125: NodeRule = {
  id: "R125",
  title: "Namespace URI of units exact",
  severity: "error",
  clause: clause(8, "§5.6.3.1, §5.6.3.4, §5.6.3.5"),
  priority: 1,
  concerns: ["Variable", "VariableType"],
  needs: ["structure"],
  condition:
    "A unit's namespaceUri that means UN/CEFACT or IEC 62720 is written exactly as the standard has it; other systems have other URIs. An empty one beside a unitId or a displayName is a warning.",
  why: "Clients compare the URI text: one that differs by a letter makes the unit unknown, and nothing is converted.",
  check(node, _ctx, report) {
    if (!hasValueAttributes(node)) return;
    for (const { uri, unitId, symbol } of listUnits(node.value)) {
      const meant = [UNECE_URI, IEC_URI].find((known) => isNearMiss(uri, known));
      if (meant !== undefined) {
        report({
          attribute: "value",
          message: `The unit of ${node.browseName.name} has the namespace “${uri}”, which only nearly is that of the standard.`,
          facts: [`Written: ${uri}`, `The standard's: ${meant}`],
          data: { uri: meant, found: uri },
        });
      } else if (uri === "" && (symbol !== "" || (unitId !== "" && unitId !== "0"))) {
        report({
          severity: "warning",
          attribute: "value",
          message: `The unit of ${node.browseName.name} has no namespace URI.`,
          facts: ["NamespaceUri: empty", `UnitId: ${unitId || "none"}, DisplayName: ${symbol || "none"}`],
        });
      }
    }
  },
  fix: attributeFix("Write the URI of the standard", "value", (node, { data }) => {
    const [wanted, found] = [data?.["uri"], data?.["found"]];
    if (!hasValueAttributes(node) || !node.value || typeof wanted !== "string" || typeof found !== "string")
      return undefined;
    const xml = node.value.xml.replace(`>${found}<`, `>${wanted}<`);
    return xml === node.value.xml ? undefined : { ...node.value, xml };
  }),
  examples: {
    good: {
      text: "The exact URI.",
      build: (m) =>
        m.property("0:EngineeringUnits", {
          parent: m.variable("T", { parent: m.object("Tank1"), type: T.AnalogUnitType }),
          dataType: D.EUInformation,
          value: CELSIUS,
        }),
    },
    bad: {
      text: "https instead of http.",
      build: (m) =>
        m.property("0:EngineeringUnits", {
          parent: m.variable("T", { parent: m.object("Tank1"), type: T.AnalogUnitType }),
          dataType: D.EUInformation,
          value: unit({
            uri: UNECE_URI.replace("http:", "https:"),
            unitId: 4408652,
            symbol: "°C",
            name: "degree Celsius",
          }),
        }),
    },
  },
};
