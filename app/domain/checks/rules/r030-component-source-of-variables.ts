import { standardKey } from "../../address-space/node-id";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

const HasArgumentDescription = standardKey(129);

export const r030: NodeRule = {
  id: "R030",
  title: "Source of HasComponent to a Variable",
  severity: "error",
  clause: clause(3, "§7.7, §5.7.2"),
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.HasComponent,
  condition:
    "A Variable is a component of an Object, an ObjectType, a DataVariable or a VariableType only. HasArgumentDescription, which starts at a Method, is the exception.",
  why: "Clients do not look for Variables below Methods, Properties or DataTypes, and servers refuse the reference.",
  check(node, ctx, report) {
    const exception = ctx.closure(HasArgumentDescription);
    for (const edge of edgesDeclaredAt(node, ctx, R.HasComponent)) {
      const source = ctx.node(edge.source);
      if (!source || ctx.classOf(edge.target) !== "Variable" || exception.has(edge.type)) continue;
      // A Property as the source is a finding of R033.
      if (["Object", "ObjectType", "Variable", "VariableType"].includes(source.nodeClass)) continue;
      report({
        attribute: "references",
        message: `${ctx.nameOf(edge.target)} cannot be a component of the ${source.nodeClass} ${source.browseName.name}.`,
        facts: [
          `${ctx.nameOf(edge.type)} from ${ctx.describe(edge.source)} to ${ctx.describe(edge.target)}`,
          `The source is a ${source.nodeClass}; allowed: Object, ObjectType, DataVariable, VariableType`,
        ],
        data: { ...edge },
      });
    }
  },
  examples: {
    good: { text: "A Variable below an Object.", build: (m) => m.variable("Speed", { parent: m.object("Pump1") }) },
    bad: {
      text: "A Variable below a Method.",
      build: (m) => m.variable("Speed", { parent: m.method("Start", { parent: m.object("Pump1") }) }),
    },
  },
};
