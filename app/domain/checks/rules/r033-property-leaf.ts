import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { ofType } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { count } from "../texts";

export const r033: NodeRule = {
  id: "R033",
  title: "A Property has no children",
  severity: "error",
  clause: clause(3, "§5.6.3, §7.3, §7.8"),
  priority: 1,
  concerns: ["Variable"],
  needs: ["children", "property"],
  condition: "The target of a HasProperty reference has no outgoing hierarchical reference of any kind.",
  why: "Properties end the tree: clients do not browse below them, so what hangs there is never found.",
  check(node, ctx, report) {
    const edges = [...ctx.childEdges(node.key), ...ctx.subtypeEdges(node.key)];
    if (edges.length === 0) return;
    const owners = ofType(ctx, ctx.parentEdges(node.key), R.HasProperty).map(
      (e) => `It is a Property of ${ctx.describe(e.source)}`,
    );
    report({
      attribute: "references",
      message: `The Property ${node.browseName.name} has ${count(edges.length, "child", "children")}.`,
      facts: [...owners, ...edges.map((e) => `${ctx.nameOf(e.type)} leads from it to ${ctx.describe(e.target)}`)],
    });
  },
  examples: {
    good: {
      text: "A Property that ends the tree.",
      build: (m) => m.property("Label", { parent: m.object("Pump1") }),
    },
    bad: {
      text: "A Property with a unit of its own.",
      build: (m) => {
        const length = m.property("Length", { parent: m.object("Pump1") });
        m.property("0:EngineeringUnits", { parent: length });
        return length;
      },
    },
  },
};
