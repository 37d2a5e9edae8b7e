import { isAbstract } from "../../address-space/node";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { attributeFix, REMOVED } from "../fixes";
import { clause, type NodeRule } from "../rule";
import { listSupertypes } from "../lookups";

export const r046: NodeRule = {
  id: "R046",
  title: "Symmetric and InverseName",
  severity: "error",
  clause: clause(3, "§5.3.2, §7.3"),
  priority: 1,
  concerns: ["ReferenceType"],
  condition:
    "A symmetric ReferenceType has no InverseName, any other has one. A hierarchical one is never symmetric, and a subtype of a concrete type keeps Symmetric.",
  why: "Seen from the target the reference has no name, or a wrong one.",
  check(node, ctx, report) {
    if (node.nodeClass !== "ReferenceType") return;
    const name = node.browseName.name;
    const isSymmetric = node.symmetric === true;
    const hasInverse = (node.inverseName ?? []).some((t) => t.text !== "");
    if (isSymmetric && hasInverse) {
      report({
        attribute: "inverseName",
        message: `${name} is symmetric and has an InverseName.`,
        facts: ["Symmetric: true", `InverseName: ${node.inverseName?.[0]?.text ?? ""}`],
        data: { kind: "surplus" },
      });
    }
    if (!isSymmetric && !hasInverse && !isAbstract(node)) {
      report({
        attribute: "inverseName",
        message: `${name} has no InverseName.`,
        facts: ["Symmetric: false", "InverseName: none"],
        data: { kind: "missing" },
      });
    }
    if (isSymmetric && listSupertypes(ctx, node.key).includes(R.HierarchicalReferences)) {
      report({
        attribute: "symmetric",
        message: `${name} is hierarchical and symmetric.`,
        facts: ["Symmetric: true", "It stands below HierarchicalReferences."],
        data: { kind: "hierarchical" },
      });
    }
    const [supertype] = listSupertypes(ctx, node.key);
    const base = supertype === undefined ? undefined : ctx.node(supertype);
    if (base?.nodeClass === "ReferenceType" && !isAbstract(base) && (base.symmetric === true) !== isSymmetric) {
      report({
        attribute: "symmetric",
        message: `${name} is ${isSymmetric ? "" : "not "}symmetric, its supertype ${base.browseName.name} is${isSymmetric ? " not" : ""}.`,
        facts: [`Symmetric here: ${isSymmetric}`, `${ctx.describe(base.key)}: ${base.symmetric === true}`],
        data: { kind: "changed" },
      });
    }
  },
  fix: attributeFix("Make an InverseName, or drop the surplus one", "inverseName", (node, finding) => {
    if (finding.data?.["kind"] === "surplus") return REMOVED;
    return finding.data?.["kind"] === "missing" ? [{ text: makeInverseName(node.browseName.name) }] : undefined;
  }),
  examples: {
    good: {
      text: "Feeds, and IsFedBy seen from the other end.",
      build: (m) => m.referenceType("Feeds", { inverseName: "IsFedBy" }),
    },
    bad: { text: "No name for the other end.", build: (m) => m.referenceType("Feeds") },
  },
};

/** `HasPump` → `PumpOf`, `Feeds` → `IsFeedsOf`: a start for the author to better. */
function makeInverseName(name: string): string {
  return /^Has[A-Z]/.test(name) ? `${name.slice(3)}Of` : `Is${name}Of`;
}
