import type { NodeKey } from "../../address-space/node-id";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { ofType } from "../lookups";
import { toNameText } from "../members";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r011: NodeRule = {
  id: "R011",
  title: "BrowseNames of Properties unique on a node",
  severity: "error",
  clause: clause(3, "§4.5.2, §5.6.3"),
  priority: 1,
  concerns: ALL_CLASSES,
  needs: ["children"],
  condition: "No node has two Properties with the same BrowseName.",
  why: "Clients read Properties by name: which of two ranges or units holds is left to chance.",
  check(node, ctx, report) {
    const first = new Map<string, NodeKey>();
    for (const { target } of ofType(ctx, ctx.childEdges(node.key), R.HasProperty)) {
      const property = ctx.node(target);
      if (!property) continue;
      const name = toNameText(property.browseName);
      const twin = first.get(name);
      if (twin === undefined) first.set(name, target);
      else if (twin !== target) {
        report({
          attribute: "references",
          message: `${node.browseName.name} has two Properties named ${property.browseName.name}.`,
          facts: [`One: ${ctx.describe(twin)}`, `The other: ${ctx.describe(target)}`],
        });
      }
    }
  },
  examples: {
    good: { text: "One Property of a name.", build: (m) => m.property("Label", { parent: m.object("Pump1") }) },
    bad: {
      text: "The same Property twice.",
      build: (m) => {
        const parent = m.object("Pump1");
        m.property("Label", { parent });
        m.property("Label", { parent });
        return parent;
      },
    },
  },
};
