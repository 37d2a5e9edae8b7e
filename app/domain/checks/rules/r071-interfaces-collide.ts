import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { findTypeDefinition, isChainLoaded, isKindOf } from "../lookups";
import { getMembers, listInterfaces, type Member } from "../members";
import type { CheckContext } from "../check-context";
import { clause, type NodeRule } from "../rule";

export const r071: NodeRule = {
  id: "R071",
  title: "Members of two Interfaces do not collide",
  severity: "error",
  clause: clause(3, "§4.10.2"),
  priority: 2,
  concerns: ["Object", "ObjectType"],
  condition:
    "Where two applied Interfaces have a member of one BrowseName, these have one NodeClass and types of which one derives from the other.",
  why: "No node can be like both, so that one of the two promises is broken.",
  check(node, ctx, report) {
    const seen = new Map<string, Member>();
    for (const applied of listInterfaces(ctx, node.key)) {
      for (const [name, member] of getMembers(ctx, applied)) {
        const other = seen.get(name);
        if (!other) seen.set(name, member);
        if (!other || other.node.key === member.node.key || isCompatible(other, member, ctx)) continue;
        report({
          attribute: "references",
          message: `Two Interfaces of ${node.browseName.name} have different members ${member.node.browseName.name}.`,
          facts: [other, member].map((m) => `${ctx.nameOf(m.owner)}: ${m.node.nodeClass}, ${ctx.describe(m.node.key)}`),
        });
      }
    }
  },
  examples: {
    good: {
      text: "Two Interfaces with different members.",
      build: (m) => {
        const rated = m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true });
        m.variable("Power", { parent: rated, rule: "Optional" });
        const pump = m.objectType("PumpType");
        m.reference(pump, R.HasInterface, rated);
        m.reference(
          pump,
          R.HasInterface,
          m.objectType("INamedType", { supertype: T.BaseInterfaceType, isAbstract: true }),
        );
        return undefined;
      },
    },
    bad: {
      text: "Power as a Variable and as an Object.",
      build: (m) => {
        const rated = m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true });
        m.variable("Power", { parent: rated, rule: "Optional" });
        const driven = m.objectType("IDrivenType", { supertype: T.BaseInterfaceType, isAbstract: true });
        m.object("Power", { parent: driven, rule: "Optional" });
        const pump = m.objectType("PumpType");
        m.reference(pump, R.HasInterface, rated);
        m.reference(pump, R.HasInterface, driven);
        return pump;
      },
    },
  },
};

function isCompatible(a: Member, b: Member, ctx: CheckContext): boolean {
  if (a.node.nodeClass !== b.node.nodeClass) return false;
  const [left, right] = [findTypeDefinition(ctx, a.node.key), findTypeDefinition(ctx, b.node.key)];
  if (left === undefined || right === undefined || !isChainLoaded(ctx, left) || !isChainLoaded(ctx, right)) return true;
  return isKindOf(ctx, left, right) || isKindOf(ctx, right, left);
}
