import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { addReference, findSubject, notPossible } from "../fixes";
import { ok } from "../../core/result";
import { findModellingRule, ofType } from "../lookups";
import { isPlaceholder } from "../members";
import { clause, type NodeRule } from "../rule";

export const r038: NodeRule = {
  id: "R038",
  title: "Every Method hangs on its owner",
  severity: "error",
  clause: `${clause(3, "§5.7.1")}, ${clause(6, "§F.7")}`,
  priority: 1,
  concerns: ["Method"],
  condition:
    "A Method is the target of at least one HasComponent from an Object or an ObjectType. A placeholder that is only organised is a hint.",
  why: "A call names the object and the Method: a Method that no object has as a component cannot be called.",
  check(node, ctx, report) {
    const parents = ctx.parentEdges(node.key);
    // A wrong kind of owner is a finding of R031.
    if (ofType(ctx, parents, R.HasComponent).length > 0) return;
    const isPlace = isPlaceholder(findModellingRule(ctx, node.key)) && parents.length > 0;
    report({
      ...(isPlace ? { severity: "hint" } : {}),
      attribute: "references",
      message: `The Method ${node.browseName.name} has no owner.`,
      facts: [
        "HasComponent references to it: 0",
        ...parents.map((e) => `${ctx.nameOf(e.type)} from ${ctx.describe(e.source)}`),
      ],
    });
  },
  fix: {
    label: "Make it a component of the object that organises it",
    apply(space, finding) {
      const node = findSubject(space, finding);
      const owner = node
        ? space
            .edgesTo(node.key)
            .find((e) => ["Object", "ObjectType"].includes(space.getNode(e.source)?.nodeClass ?? ""))
        : undefined;
      return node && owner ? ok([addReference(space, owner.source, R.HasComponent, node.key)]) : notPossible(finding);
    },
  },
  examples: {
    good: { text: "A component of an Object.", build: (m) => m.method("Start", { parent: m.object("Pump1") }) },
    bad: {
      text: "A Method that is only organised.",
      build: (m) => m.method("Start", { parent: m.object("Pump1"), reference: R.Organizes }),
    },
  },
};
