import { OPC_UA_NAMESPACE } from "../../address-space/node-id";
import { formatQualifiedName } from "../../address-space/qualified-name";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r172: NodeRule = {
  id: "R172",
  title: "Namespaces of ids and names are known",
  severity: "error",
  clause: clause(6, "§F.2, §5.1.12"),
  priority: 1,
  concerns: ALL_CLASSES,
  condition:
    "The namespace of a BrowseName stands in the namespace table or is defined by a loaded model. Indices beyond the table are found while a file is read.",
  why: "A name in a namespace that nobody defines is a slip of an index: clients look for it in another namespace.",
  check({ browseName }, ctx, report) {
    const { namespaceUri, name } = browseName;
    const { namespaceUris } = ctx;
    if (
      namespaceUri === OPC_UA_NAMESPACE ||
      namespaceUris.includes(namespaceUri) ||
      ctx.isNamespaceLoaded(namespaceUri)
    )
      return;
    report({
      attribute: "browseName",
      message: `The BrowseName ${name} is in a namespace that neither the model nor a required model has.`,
      facts: [`BrowseName: ${formatQualifiedName(browseName)}`, `NamespaceUris: ${namespaceUris.join(", ") || "none"}`],
    });
  },
  examples: {
    good: { text: "A name in the own namespace.", build: (m) => m.object("Pump1") },
    bad: {
      text: "A name in a namespace that is nowhere.",
      build: (m) => {
        const pump = m.object("Pump1");
        m.set(pump, { browseName: { namespaceUri: "http://example.org/UA/Parts/", name: "Pump1" } });
        return pump;
      },
    },
  },
};
