import { OPC_UA_NAMESPACE } from "../../address-space/node-id";
import { attributeFix } from "../fixes";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r007: NodeRule = {
  id: "R007",
  title: "BrowseName of namespace 0 does not begin with digits and a colon",
  severity: "error",
  clause: clause(6, "§5.1.12"),
  priority: 2,
  concerns: ALL_CLASSES,
  condition: "In namespace 0 the name part does not begin with digits followed by a colon.",
  why: "Written without a prefix, such a name is read back as a namespace index and another name.",
  check({ browseName }, _ctx, report) {
    if (browseName.namespaceUri !== OPC_UA_NAMESPACE || !/^\d+:/.test(browseName.name)) return;
    report({
      attribute: "browseName",
      message: `The name “${browseName.name}” in namespace 0 would be read as an index and a name.`,
      facts: [`Name: ${browseName.name}`, "Namespace: 0, which is written without an index"],
    });
  },
  fix: attributeFix("Drop the digits and the colon", "browseName", ({ browseName }) => {
    const name = browseName.name.replace(/^(?:\d+:)+/, "");
    return name === "" ? undefined : { ...browseName, name };
  }),
  examples: {
    good: { text: "A plain name.", build: (m) => m.property("0:NodeVersion", { parent: m.object("Pump1") }) },
    bad: {
      text: "An index that became a part of the name.",
      build: (m) => m.property("0:3:NodeVersion", { parent: m.object("Pump1") }),
    },
  },
};
