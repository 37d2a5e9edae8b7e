import type { Node } from "../../address-space/node";
import { getDataType, getValueRank, hasValueAttributes } from "../../address-space/node";
import type { CheckContext } from "../check-context";
import { findModellingRule, findTypeDefinition } from "../lookups";
import { findInheritedMember } from "../members";
import { addOverride } from "../example-overrides";
import { clause, type NodeRule } from "../rule";
import { findSubject, notPossible } from "../fixes";
import { ok } from "../../core/result";
import { listUses } from "../../address-space/address-space";

export const r084: NodeRule = {
  id: "R084",
  title: "Needless override",
  severity: "warning",
  clause: clause(3, "§6.3.3.3"),
  priority: 2,
  concerns: ["Object", "Variable", "Method"],
  needs: ["member of type"],
  condition:
    "A subtype repeats an inherited declaration only where it changes something: type, rule, DataType, rank, texts, references, children.",
  why: "The copy must be kept in step with the original for ever, and hides later changes of it.",
  check(node, ctx, report) {
    if (ctx.childEdges(node.key).length > 0) return;
    for (const { source, type } of ctx.parentEdges(node.key)) {
      const owner = ctx.node(source);
      if (owner?.nodeClass !== "ObjectType" && owner?.nodeClass !== "VariableType") continue;
      const base = findInheritedMember(ctx, source, node.browseName);
      if (!base || base.node.key === node.key || base.referenceType !== type) continue;
      const inherited = ctx.node(base.node.key);
      if (!inherited || !isCopy(node, inherited, ctx)) continue;
      report({
        message: `${node.browseName.name} of ${owner.browseName.name} only repeats what it inherits.`,
        facts: [
          `Inherited: ${ctx.describe(base.node.key)} of ${ctx.describe(base.owner)}`,
          "Same type, rule, DataType, rank, texts, no children",
        ],
      });
    }
  },
  fix: {
    label: "Remove the copy",
    apply(space, finding) {
      const node = findSubject(space, finding);
      if (!node || listUses(space.own, node).length > 0) return notPossible(finding);
      return ok([{ kind: "removeNode", key: node.key }]);
    },
  },
  examples: {
    good: {
      text: "The override changes the rule.",
      build: (m) => addOverride(m, "Optional", "Mandatory"),
    },
    bad: {
      text: "An exact copy.",
      build: (m) => addOverride(m, "Mandatory", "Mandatory"),
    },
  },
};

function isCopy(node: Node, base: Node, ctx: CheckContext): boolean {
  if (node.nodeClass !== base.nodeClass || ctx.childEdges(base.key).length > 0) return false;
  const facts = (n: Node): unknown => [
    findTypeDefinition(ctx, n.key),
    findModellingRule(ctx, n.key),
    hasValueAttributes(n) ? [getDataType(n), getValueRank(n), n.arrayDimensions ?? "", n.value?.xml ?? ""] : [],
    n.nodeClass === "Variable" ? [n.accessLevel ?? 1, n.historizing ?? false, n.minimumSamplingInterval ?? 0] : [],
    n.nodeClass === "Object" ? (n.eventNotifier ?? 0) : 0,
    n.displayName.map((t) => t.text),
    (n.description ?? []).map((t) => t.text),
    ctx
      .otherEdges(n.key)
      .map((e) => [e.type, e.target])
      .sort(),
  ];
  return JSON.stringify(facts(node)) === JSON.stringify(facts(base));
}
