import { formatQualifiedName } from "../../address-space/qualified-name";
import type { CheckContext } from "../check-context";
import { findTypeDefinition, isChainLoaded, isKindOf, isProperty } from "../lookups";
import { getChildren, getMembers, isNaming, listInterfaces, type Member } from "../members";
import { clause, type NodeRule } from "../rule";
import type { NodeHead } from "../views";

export const r090: NodeRule = {
  id: "R090",
  title: "Member like its declaration",
  severity: "error",
  clause: clause(3, "§4.6.4, §6.2.4, §6.4.1, §6.4.2"),
  priority: 1,
  concerns: ["Object", "Variable"],
  needs: ["children"],
  condition:
    "A child with the BrowseName of a Mandatory or Optional declaration of the type or an Interface has the declared NodeClass and the declared type or a subtype. Of several children of one name one must fit.",
  why: "A client that knows the type expects a Variable of a known type at this path and finds something else.",
  check(node, ctx, report) {
    const type = findTypeDefinition(ctx, node.key);
    const sources = [
      ...(type === undefined ? [] : [type, ...listInterfaces(ctx, type)]),
      ...listInterfaces(ctx, node.key),
    ];
    for (const [name, same] of getChildren(ctx, node.key)) {
      for (const source of sources) {
        const member = getMembers(ctx, source).get(name);
        if (!member || !isNaming(member.rule) || same.some((child) => isSimilar(child, member, ctx))) continue;
        const child = same.find((c) => ctx.isOwn(c.key)) ?? same[0];
        if (!child) continue;
        const declared = findTypeDefinition(ctx, member.node.key);
        const found = findTypeDefinition(ctx, child.key);
        report({
          key: ctx.isOwn(child.key) ? child.key : node.key,
          attribute: "references",
          message: `${child.browseName.name} of ${node.browseName.name} is not like its declaration in ${ctx.nameOf(member.owner)}.`,
          facts: [
            `Declared: ${member.node.nodeClass}${declared === undefined ? "" : ` of type ${ctx.describe(declared)}`}, by ${ctx.describe(member.node.key)}`,
            `Here: ${child.nodeClass}${found === undefined ? "" : ` of type ${ctx.describe(found)}`}`,
            `BrowseName of both: ${formatQualifiedName(child.browseName)}`,
          ],
          data: { declared: declared ?? "", member: member.node.key },
        });
        break;
      }
    }
  },
  examples: {
    good: {
      text: "The member has the declared class and type.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.variable("Speed", { parent: pump, rule: "Mandatory" });
        m.variable("Speed", { parent: m.object("Pump1", { type: pump }) });
        return undefined;
      },
    },
    bad: {
      text: "The type declares a Variable, the instance has an Object.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.variable("Speed", { parent: pump, rule: "Optional" });
        return m.object("Speed", { parent: m.object("Pump1", { type: pump }) });
      },
    },
  },
};

/** Same class and, for Objects and Variables, the same type or one below it; an unknown type is given the benefit of the doubt. */
function isSimilar(child: NodeHead, { node: declared }: Member, ctx: CheckContext): boolean {
  if (child.key === declared.key) return true;
  if (child.nodeClass !== declared.nodeClass) return false;
  if (child.nodeClass === "Method") return true;
  // A Property of a wrong type is a finding of R035.
  if (isProperty(ctx, child.key) && isProperty(ctx, declared.key)) return true;
  const wanted = findTypeDefinition(ctx, declared.key);
  const found = findTypeDefinition(ctx, child.key);
  if (wanted === undefined || found === undefined || !isChainLoaded(ctx, found) || ctx.classOf(wanted) === undefined)
    return true;
  return isKindOf(ctx, found, wanted);
}
