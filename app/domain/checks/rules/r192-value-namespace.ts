import { hasValueAttributes } from "../../address-space/node";
import { scalar } from "../example-values";
import { clause, type NodeRule } from "../rule";
import { readValueTree } from "../value-xml";

const TYPES = "http://opcfoundation.org/UA/2008/02/Types.xsd";

export const r192: NodeRule = {
  id: "R192",
  title: "Values stand in the namespace of Types.xsd",
  severity: "error",
  clause: clause(6, "§F.1, §F.2, §F.8, §5.3.1.17"),
  priority: 1,
  concerns: ["Variable", "VariableType"],
  needs: ["value"],
  condition: "A Value is one well-formed element of the XML namespace http://opcfoundation.org/UA/2008/02/Types.xsd.",
  why: "Readers look the element up by its namespace: another one is an unknown type, and the value is lost.",
  check(node, _ctx, report) {
    if (!hasValueAttributes(node) || !node.value) return;
    const tree = readValueTree(node.value);
    const name = node.browseName.name;
    if (tree.kind === "broken") {
      report({
        attribute: "value",
        message: `The Value of ${name} is not one XML element.`,
        facts: [`Value: ${node.value.xml.trim().slice(0, 120)}`],
      });
    } else if (tree.kind === "value" && tree.root.namespaceUri !== TYPES) {
      report({
        attribute: "value",
        message: `The Value of ${name} does not stand in the namespace of Types.xsd.`,
        facts: [
          `Element: ${tree.root.name}`,
          `Its namespace: ${tree.root.namespaceUri || "none"}`,
          `Asked for: ${TYPES}`,
        ],
      });
    }
  },
  examples: {
    good: {
      text: "The namespace of Types.xsd.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), value: scalar("Double", 1) }),
    },
    bad: {
      text: "Another namespace.",
      build: (m) =>
        m.variable("Speed", {
          parent: m.object("Pump1"),
          value: { xml: '<Double xmlns="http://example.org/Types.xsd">1</Double>' },
        }),
    },
  },
};
