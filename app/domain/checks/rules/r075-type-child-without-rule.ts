import { keyOf, modellingRuleFix } from "../fixes";
import { standardKey } from "../../address-space/node-id";
import { StandardReferenceType as R, StandardType as T, StandardModellingRule } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import { findModellingRule, findTypeDefinition, isInstanceDeclaration, isKindOf, ofType } from "../lookups";
import { findMemberAbove } from "../members";
import { clause, type NodeRule } from "../rule";
import type { Node } from "../../address-space/node";

const StateType = standardKey(2307);
const TransitionType = standardKey(2310);

export const r075: NodeRule = {
  id: "R075",
  title: "Child of a type without modelling rule",
  severity: "hint",
  clause: clause(3, "§6.2.2"),
  priority: 1,
  concerns: ["Object", "Variable", "Method"],
  needs: ["type above"],
  condition:
    "A child of an ObjectType, a VariableType or an instance declaration has a modelling rule. States, Transitions and DefaultInstanceBrowseName belong to the type alone.",
  why: "Without a rule the member stays on the type: subtypes do not inherit it, and no instance gets it. Often the rule was forgotten.",
  check(node, ctx, report) {
    if (findModellingRule(ctx, node.key) !== undefined || isMeantForType(node, ctx)) return;
    const owner = ofType(ctx, ctx.parentEdges(node.key), R.Aggregates).find(({ source }) => {
      const parent = ctx.classOf(source);
      return parent === "ObjectType" || parent === "VariableType" || isInstanceDeclaration(ctx, source);
    });
    if (!owner) return;
    report({
      attribute: "references",
      message: `${node.browseName.name} has no modelling rule, so instances of ${ctx.nameOf(owner.source)} do not get it.`,
      facts: [`${ctx.nameOf(owner.type)} from ${ctx.describe(owner.source)}`, "HasModellingRule references: 0"],
      data: { rule: findMemberAbove(ctx, owner.source, node.browseName)?.rule ?? StandardModellingRule.Optional },
    });
  },
  fix: modellingRuleFix(
    "Take the rule that it follows, else Optional, so that instances may have it",
    (_node, finding) => keyOf(finding, "rule"),
  ),
  examples: {
    good: {
      text: "A member that instances get.",
      build: (m) => m.variable("Speed", { parent: m.objectType("PumpType"), rule: "Mandatory" }),
    },
    bad: { text: "The rule was forgotten.", build: (m) => m.variable("Speed", { parent: m.objectType("PumpType") }) },
  },
};

function isMeantForType(node: Node, ctx: CheckContext): boolean {
  const { browseName } = node;
  if (browseName.name === "DefaultInstanceBrowseName" && browseName.namespaceUri === "http://opcfoundation.org/UA/")
    return true;
  const type = findTypeDefinition(ctx, node.key);
  if (type === undefined) return false;
  return [StateType, TransitionType, T.DataTypeEncodingType].some((t) => isKindOf(ctx, type, t));
}
