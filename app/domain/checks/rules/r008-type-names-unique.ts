import { formatQualifiedName } from "../../address-space/qualified-name";
import { TYPE_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r008: NodeRule = {
  id: "R008",
  title: "Names of types unique",
  severity: "error",
  clause: clause(3, "§5.2.4, §5.3.2"),
  priority: 1,
  concerns: TYPE_CLASSES,
  condition:
    "Namespace and name are unique among all ObjectTypes, VariableTypes, DataTypes and ReferenceTypes together.",
  why: "Clients and code generators find types by their BrowseName; two of one name give two classes of one name, or the wrong type.",
  check(node, ctx, report) {
    // Two nodes of one NodeId are one finding of R002, not one more here.
    for (const twin of ctx.listTypesNamed(node.browseName)) {
      if (twin === node.key || ctx.nodeIdOf(twin) === ctx.nodeIdOf(node.key)) continue;
      report({
        attribute: "browseName",
        message: `The type name ${node.browseName.name} is taken already.`,
        facts: [
          `BrowseName: ${formatQualifiedName(node.browseName)}`,
          `Also borne by the ${ctx.classOf(twin) ?? "type"} ${ctx.describe(twin)}`,
        ],
      });
    }
  },
  examples: {
    good: {
      text: "Each type has a name of its own.",
      build: (m) => (m.objectType("PumpType"), m.variableType("PumpStateType")),
    },
    bad: {
      text: "A DataType named like an ObjectType of the same namespace.",
      build: (m) => {
        m.objectType("PumpType");
        return m.dataType("PumpType");
      },
    },
  },
};
