import type { NodeKey } from "../../address-space/node-id";
import { addReference, findSubject, notPossible } from "../fixes";
import { ok } from "../../core/result";
import { StandardDataType as D, StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { TYPE_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

const ROOTS: ReadonlySet<string> = new Set([T.BaseObjectType, T.BaseVariableType, D.BaseDataType, R.References]);

export const r042: NodeRule = {
  id: "R042",
  title: "One supertype",
  severity: "error",
  clause: `${clause(3, "§5.3.3.3, §7.2, §7.10, §5.5.2, §5.6.5, §5.8.3, §4.10.1, §6.3.1")}, ${clause(5, "§6.2, §7.2, §7.4")}`,
  priority: 1,
  concerns: TYPE_CLASSES,
  condition:
    "Every type but the four roots has a supertype; a ReferenceType has exactly one. A second supertype of another type is a warning: not forbidden, but its inheritance is undefined.",
  why: "A type without a supertype is found by nobody who browses the type trees; with two of them tools inherit from the one or the other.",
  check(node, ctx, report) {
    if (ROOTS.has(node.key)) return;
    const supertypes = ctx.supertypeEdges(node.key).map((e) => e.source);
    if (supertypes.length === 0) {
      report({
        attribute: "references",
        message: `The ${node.nodeClass} ${node.browseName.name} has no supertype.`,
        facts: ["HasSubtype references to it: 0"],
      });
    } else if (supertypes.length > 1) {
      report({
        severity: node.nodeClass === "ReferenceType" ? "error" : "warning",
        attribute: "references",
        message: `The ${node.nodeClass} ${node.browseName.name} has ${supertypes.length} supertypes.`,
        facts: supertypes.map((key) => `Supertype: ${ctx.describe(key)}`),
      });
    }
  },
  fix: {
    label: "Derive it from the base type of its class",
    apply(space, finding) {
      const node = findSubject(space, finding);
      const root = node && BASES.get(node.nodeClass);
      if (!node || root === undefined || space.edgesTo(node.key).some((e) => e.type === R.HasSubtype))
        return notPossible(finding);
      return ok([addReference(space, root, R.HasSubtype, node.key)]);
    },
  },
  examples: {
    good: { text: "One supertype.", build: (m) => m.objectType("PumpType") },
    bad: {
      text: "No supertype.",
      build: (m) => {
        const type = m.objectType("PumpType");
        m.removeReferences(type, R.HasSubtype);
        return type;
      },
    },
  },
};

/** What a type derives from where nothing else is known; DataTypes have no such base. */
const BASES: ReadonlyMap<string, NodeKey> = new Map([
  ["ObjectType", T.BaseObjectType],
  ["VariableType", T.BaseDataVariableType],
  ["ReferenceType", R.NonHierarchicalReferences],
]);
