import type { Node } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import type { CheckContext } from "../check-context";
import { keyOf, typeDefinitionFix } from "../fixes";
import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { findTypeDefinition, listTypeDefinitions } from "../lookups";
import { findMemberAbove } from "../members";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r049: NodeRule = {
  id: "R049",
  title: "One type definition of the right class",
  severity: "error",
  clause: clause(3, "§5.5.1, §5.6.2, §7.13"),
  priority: 1,
  concerns: ALL_CLASSES,
  condition:
    "An Object has exactly one type definition, an ObjectType; a Variable exactly one, a VariableType; no other class has any.",
  why: "Without its type a node cannot be understood or created; loaders refuse it or make it an instance of a base type.",
  check(node, ctx, report) {
    const types = listTypeDefinitions(ctx, node.key);
    const [only] = types;
    const wanted =
      node.nodeClass === "Object" ? "ObjectType" : node.nodeClass === "Variable" ? "VariableType" : undefined;
    if (wanted !== undefined && types.length === 1 && only !== undefined && (ctx.classOf(only) ?? wanted) === wanted)
      return;
    const attribute = "references";
    const facts = types.map((key) => `HasTypeDefinition: ${ctx.describe(key)}`);
    if (wanted === undefined) {
      if (types.length === 0) return;
      report({
        attribute,
        message: `The ${node.nodeClass} ${node.browseName.name} has a type definition.`,
        facts: [...facts, "Only Objects and Variables have one."],
      });
      return;
    }
    const data = { declared: findDeclaredType(node, ctx) ?? "" };
    if (types.length !== 1) {
      const message = `The ${node.nodeClass} ${node.browseName.name} has ${types.length === 0 ? "no" : types.length} type definition${types.length > 1 ? "s" : ""}.`;
      report({ attribute, message, facts: facts.length > 0 ? facts : ["HasTypeDefinition references: 0"], data });
    }
    for (const key of types) {
      const type = ctx.node(key);
      if (!type || type.nodeClass === wanted) continue;
      const message = `The type definition of the ${node.nodeClass} ${node.browseName.name} is the ${type.nodeClass} ${type.browseName.name}.`;
      report({
        attribute,
        message,
        facts: [...facts, `NodeClass of the type: ${type.nodeClass}; allowed: ${wanted}`],
        data,
      });
    }
  },
  fix: typeDefinitionFix("Take the type of the declaration that it follows, else the base type", (node, finding) => {
    const declared = keyOf(finding, "declared");
    if (declared !== undefined) return declared;
    if (node.nodeClass === "Object") return T.BaseObjectType;
    if (node.nodeClass !== "Variable") return undefined;
    return node.references.some((r) => r.type === R.HasProperty && !r.isForward)
      ? T.PropertyType
      : T.BaseDataVariableType;
  }),
  examples: {
    good: {
      text: "An Object typed by an ObjectType.",
      build: (m) => m.object("Pump1", { type: m.objectType("PumpType") }),
    },
    bad: {
      text: "An Object typed by a VariableType.",
      build: (m) => m.object("Pump1", { type: T.BaseDataVariableType }),
    },
  },
};

/** The type that the declaration has which the node follows. */
function findDeclaredType({ key, browseName }: Node, ctx: CheckContext): NodeKey | undefined {
  for (const { source } of ctx.parentEdges(key)) {
    const member = findMemberAbove(ctx, source, browseName);
    const type = member && member.node.key !== key ? findTypeDefinition(ctx, member.node.key) : undefined;
    if (type !== undefined) return type;
  }
  return undefined;
}
