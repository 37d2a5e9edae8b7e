import type { DeclaredReference, Node } from "../../address-space/node";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { isAbstract } from "../../address-space/node";
import type { CheckContext } from "../check-context";
import { findSubject, isSameReference, notPossible } from "../fixes";
import { ok } from "../../core/result";
import type { Operation } from "../../editing/operation";
import { isKindOf } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r025: NodeRule = {
  id: "R025",
  title: "The same reference only once",
  severity: "error",
  clause: clause(3, "§4.4.4"),
  priority: 1,
  concerns: ALL_CLASSES,
  condition:
    "Between two nodes there is one reference of a type; a concrete type and its subtype count as the same. Forward at the one node and inverse at the other are one reference.",
  why: "Servers refuse the second one, or clients see the target twice.",
  check(node, ctx, report) {
    node.references.forEach((reference, index) => {
      const earlier = node.references.slice(0, index).find((other) => isSameOrKind(other, reference, ctx));
      if (!earlier) return;
      const isRepeat = earlier.type === reference.type;
      report({
        attribute: "references",
        message: isRepeat
          ? `${node.browseName.name} has the same ${ctx.nameOf(reference.type)} to ${ctx.nameOf(reference.target)} twice.`
          : `${node.browseName.name} has both ${ctx.nameOf(earlier.type)} and ${ctx.nameOf(reference.type)} to ${ctx.nameOf(reference.target)}.`,
        facts: [
          `${reference.isForward ? "Forward" : "Inverse"} to ${ctx.describe(reference.target)}`,
          isRepeat
            ? "Declared twice at this node"
            : `One of ${ctx.nameOf(earlier.type)} and ${ctx.nameOf(reference.type)} is a subtype of the other.`,
        ],
      });
    });
  },
  fix: {
    label: "Keep one of them, the more special",
    apply(space, finding) {
      const node = findSubject(space, finding);
      if (!node) return notPossible(finding);
      const twice = node.references.find((r, i) => node.references.slice(0, i).some((o) => isSameReference(o, r)));
      if (!twice || twice.serverUri !== undefined) return notPossible(finding);
      const [source, target] = twice.isForward ? [node.key, twice.target] : [twice.target, node.key];
      const removed: Operation = { kind: "removeReference", source, type: twice.type, target };
      const declaredAt = twice.isForward ? "source" : "target";
      return ok([removed, { kind: "addReference", source, type: twice.type, target, declaredAt }]);
    },
  },
  examples: {
    good: { text: "One reference.", build: (m) => m.variable("Speed", { parent: m.object("Pump1") }) },
    bad: {
      text: "The same HasComponent twice.",
      build: (m) => {
        const pump = m.object("Pump1");
        const speed = m.variable("Speed", { parent: pump });
        m.set(speed, {
          references: [...m.get(speed).references, { type: R.HasComponent, target: pump, isForward: false }],
        });
        return speed;
      },
    },
  },
};

function isSameOrKind(a: DeclaredReference, b: DeclaredReference, ctx: CheckContext): boolean {
  if (isSameReference(a, b)) return true;
  if (a.target !== b.target || a.isForward !== b.isForward || a.serverUri !== b.serverUri) return false;
  if (isKindOf(ctx, a.type, b.type)) return isConcrete(ctx.node(b.type));
  return isKindOf(ctx, b.type, a.type) && isConcrete(ctx.node(a.type));
}

function isConcrete(node: Node | undefined): boolean {
  return node !== undefined && !isAbstract(node);
}
