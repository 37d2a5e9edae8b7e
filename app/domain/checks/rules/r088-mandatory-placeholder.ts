import { findTypeDefinition, isChainLoaded, isKindOf } from "../lookups";
import { listMandatoryPlaceholders, type Member } from "../members";
import type { NodeKey } from "../../address-space/node-id";
import type { CheckContext } from "../check-context";
import { clause, type NodeRule } from "../rule";

export const r088: NodeRule = {
  id: "R088",
  title: "A mandatory placeholder is filled",
  severity: "error",
  clause: clause(3, "§6.4.4.4.5"),
  priority: 1,
  concerns: ["Object", "Variable"],
  needs: ["no type above"],
  condition:
    "A plain instance has for each MandatoryPlaceholder of its type at least one child of the declared type over the same reference type, or subtypes of these.",
  why: "The type promises at least one; clients that list them find none.",
  check(node, ctx, report) {
    const type = findTypeDefinition(ctx, node.key);
    if (type === undefined) return;
    for (const member of listMandatoryPlaceholders(ctx, type)) {
      if (ctx.childEdges(node.key).some((e) => fills(e, member, ctx))) continue;
      const wanted = findTypeDefinition(ctx, member.node.key);
      report({
        message: `${node.browseName.name} has nothing for the mandatory placeholder ${member.node.browseName.name} of ${ctx.nameOf(type)}.`,
        facts: [
          `Declared: ${ctx.describe(member.node.key)}, ${member.node.nodeClass}${wanted === undefined ? "" : ` of type ${ctx.describe(wanted)}`}`,
          `Looked for over ${ctx.nameOf(member.referenceType)}`,
        ],
      });
    }
  },
  examples: {
    good: {
      text: "One pump of the plant.",
      build: (m) => {
        const plant = m.objectType("PlantType");
        m.object("<Pump>", { parent: plant, rule: "MandatoryPlaceholder" });
        m.object("Pump1", { parent: m.object("Plant1", { type: plant }) });
        return undefined;
      },
    },
    bad: {
      text: "A plant without a pump.",
      build: (m) => {
        const plant = m.objectType("PlantType");
        m.object("<Pump>", { parent: plant, rule: "MandatoryPlaceholder" });
        return m.object("Plant1", { type: plant });
      },
    },
  },
};

function fills(edge: { type: NodeKey; target: NodeKey }, { node, referenceType }: Member, ctx: CheckContext): boolean {
  const child = ctx.node(edge.target);
  if (!ctx.closure(referenceType).has(edge.type) || child?.nodeClass !== node.nodeClass) return false;
  const [wanted, found] = [findTypeDefinition(ctx, node.key), findTypeDefinition(ctx, edge.target)];
  return wanted === undefined || found === undefined || isKindOf(ctx, found, wanted) || !isChainLoaded(ctx, found);
}
