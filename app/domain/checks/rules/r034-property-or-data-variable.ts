import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { ofType } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r034: NodeRule = {
  id: "R034",
  title: "Property or DataVariable, not both",
  severity: "error",
  clause: clause(3, "§5.6.3, §5.6.4"),
  priority: 1,
  concerns: ["Variable"],
  condition: "A Variable is not the target of HasProperty and of HasComponent at once, whatever the sources.",
  why: "The two roles exclude each other: what a client may find below the node, and with which attributes, depends on the role.",
  check(node, ctx, report) {
    const parents = ctx.parentEdges(node.key);
    const property = ofType(ctx, parents, R.HasProperty)[0];
    const component = ofType(ctx, parents, R.HasComponent)[0];
    if (!property || !component) return;
    report({
      attribute: "references",
      message: `${node.browseName.name} is a Property of ${ctx.nameOf(property.source)} and a component of ${ctx.nameOf(component.source)}.`,
      facts: [
        `${ctx.nameOf(property.type)} from ${ctx.describe(property.source)}`,
        `${ctx.nameOf(component.type)} from ${ctx.describe(component.source)}`,
      ],
    });
  },
  examples: {
    good: { text: "A Property.", build: (m) => m.property("Label", { parent: m.object("Pump1") }) },
    bad: {
      text: "A Property of the one and a component of the other.",
      build: (m) => {
        const label = m.property("Label", { parent: m.object("Pump1") });
        m.reference(m.object("Pump2"), R.HasComponent, label);
        return label;
      },
    },
  },
};
