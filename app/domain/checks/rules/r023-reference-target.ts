import type { DeclaredReference, Node } from "../../address-space/node";
import { standardKey, type NodeKey } from "../../address-space/node-id";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r023: NodeRule = {
  id: "R023",
  title: "Target of a reference exists",
  severity: "error",
  clause: `${clause(3, "§5.3.3.3, §5.5.1, §5.6.2, §7.12, §7.13, §4.4.4")}, ${clause(6, "§F.2")}`,
  priority: 1,
  concerns: ALL_CLASSES,
  condition:
    "Type definition, modelling rule and supertype exist where their namespace is loaded. Any other missing target is a warning (common practice: the standard lets a target be absent).",
  why: "Loaders refuse a node without its type, or give it a base type silently; other dangling references are dropped without a word.",
  check(node, ctx, report) {
    for (const reference of node.references) {
      const { target, type, serverUri } = reference;
      if (serverUri !== undefined || ctx.classOf(target) !== undefined) continue;
      const namespace = ctx.namespaceOf(target);
      if (namespace !== undefined && !ctx.isNamespaceLoaded(namespace)) continue;
      const isNeeded = isNeededTarget(reference);
      report({
        severity: isNeeded ? "error" : "warning",
        attribute: "references",
        message: `${nameReference(ctx, type, reference.isForward)} of ${node.browseName.name} names ${target}, which does not exist.`,
        facts: [
          `Target: ${target}`,
          namespace === undefined
            ? "The text is no NodeId."
            : `The namespace ${namespace} is loaded and has no such node.`,
        ],
        data: { type, target },
      });
    }
  },
  examples: {
    good: {
      text: "The type definition is loaded.",
      build: (m) => m.object("Pump1", { type: m.objectType("PumpType") }),
    },
    bad: {
      text: "The type definition names a node that namespace 0 does not have.",
      build: (m) => m.object("Pump1", { type: standardKey(4294967290) }),
    },
  },
};

function isNeededTarget({ type, isForward }: DeclaredReference): boolean {
  if (type === R.HasSubtype) return !isForward;
  return isForward && (type === R.HasTypeDefinition || type === R.HasModellingRule);
}

function nameReference(ctx: CheckContext, type: NodeKey, isForward: boolean): string {
  const node: Node | undefined = ctx.node(type);
  return `${isForward ? "" : "Inverse "}${node?.browseName.name ?? type}`;
}
