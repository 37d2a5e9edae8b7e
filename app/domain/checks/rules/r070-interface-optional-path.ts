import { StandardModellingRule as M } from "../../address-space/standard-ids";
import { findModellingRule } from "../lookups";
import { getMembers, listInterfaces, toNameText } from "../members";
import { clause, type NodeRule } from "../rule";
import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";

export const r070: NodeRule = {
  id: "R070",
  title: "Optional paths of an Interface not used for something else",
  severity: "error",
  clause: clause(3, "§4.10.2"),
  priority: 2,
  concerns: ["ObjectType"],
  condition:
    "A member with the BrowseName of an Optional member of an applied Interface is of its NodeClass and is Mandatory or Optional.",
  why: "Clients that know the Interface find something else at the path than it promises.",
  check(node, ctx, report) {
    for (const applied of listInterfaces(ctx, node.key)) {
      const declared = getMembers(ctx, applied);
      for (const { target } of ctx.childEdges(node.key)) {
        const child = ctx.node(target);
        const member = child && declared.get(toNameText(child.browseName));
        if (!child || !member || member.rule !== M.Optional || child.key === member.node.key) continue;
        const rule = findModellingRule(ctx, target);
        if (child.nodeClass === member.node.nodeClass && (rule === M.Mandatory || rule === M.Optional)) continue;
        report({
          key: ctx.isOwn(target) ? target : node.key,
          message: `${child.browseName.name} stands where the Interface ${ctx.nameOf(applied)} has something else.`,
          facts: [
            `Interface: ${member.node.nodeClass}, Optional, ${ctx.describe(member.node.key)}`,
            `Here: ${child.nodeClass}, ${rule === undefined ? "no rule" : ctx.nameOf(rule)}`,
          ],
        });
      }
    }
  },
  examples: {
    good: {
      text: "The member is like the Interface's.",
      build: (m) => {
        const face = m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true });
        m.variable("Power", { parent: face, rule: "Optional" });
        const pump = m.objectType("PumpType");
        m.reference(pump, R.HasInterface, face);
        m.variable("Power", { parent: pump, rule: "Optional" });
        return undefined;
      },
    },
    bad: {
      text: "An Object where the Interface has a Variable.",
      build: (m) => {
        const face = m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true });
        m.variable("Power", { parent: face, rule: "Optional" });
        const pump = m.objectType("PumpType");
        m.reference(pump, R.HasInterface, face);
        return m.object("Power", { parent: pump, rule: "Optional" });
      },
    },
  },
};
