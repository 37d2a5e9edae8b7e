import type { Node } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardObject, StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { makeLookup, type CheckContext } from "../check-context";
import { addReference, findSubject, notPossible } from "../fixes";
import { ok } from "../../core/result";
import { findTypeDefinition, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

export const r039: NodeRule = {
  id: "R039",
  title: "Objects and Views can be reached from Root",
  severity: "hint",
  clause: `common practice, no source (${clause(6, "§F.1, §F.2")} allow unattached nodes)`,
  priority: 1,
  concerns: ["Object", "View"],
  condition:
    "A plain Object or View is reached from Root along hierarchical references. Encodings, modelling rules, dictionary entries and nodes that only define a name are exempt.",
  why: "What cannot be browsed to is found only by those who know its NodeId.",
  check(node, ctx, report) {
    if (ctx.lookUp(reaches, node.key) || isExempt(node, ctx)) return;
    report({
      attribute: "references",
      message: `The ${node.nodeClass} ${node.browseName.name} cannot be reached from Root.`,
      facts: [
        `Hierarchical references to it: ${ctx.parentEdges(node.key).length}`,
        ...ctx.parentEdges(node.key).map((e) => `${ctx.nameOf(e.type)} from ${ctx.describe(e.source)}`),
      ],
    });
  },
  fix: {
    label: "Put it below the Objects folder",
    apply(space, finding) {
      const node = findSubject(space, finding);
      if (!node || space.edgesTo(node.key).length > 0) return notPossible(finding);
      const folder = node.nodeClass === "View" ? StandardObject.ViewsFolder : StandardObject.ObjectsFolder;
      return space.getNode(folder) ? ok([addReference(space, folder, R.Organizes, node.key)]) : notPossible(finding);
    },
  },
  examples: {
    good: { text: "Below the Objects folder.", build: (m) => m.object("Pump1") },
    bad: {
      text: "An Object with children and without a parent.",
      build: (m) => {
        const pump = m.object("Pump1");
        m.removeReferences(pump, R.Organizes);
        m.variable("Speed", { parent: pump });
        return pump;
      },
    },
  },
};

/** Root, or a node whose model is not loaded, somewhere above. */
const reaches = makeLookup<boolean>((ctx, key) => {
  const seen = new Set<NodeKey>([key]);
  for (const at of seen) {
    if (at === StandardObject.RootFolder || ctx.classOf(at) === undefined) return true;
    for (const { source } of ctx.parentEdges(at)) seen.add(source);
    for (const { source } of ctx.supertypeEdges(at)) seen.add(source);
  }
  return false;
});

function isExempt(node: Node, ctx: CheckContext): boolean {
  if (node.nodeClass === "Object" && node.designToolOnly) return true;
  const type = findTypeDefinition(ctx, node.key);
  const exempt = [T.DataTypeEncodingType, T.ModellingRuleType, N.DictionaryEntryType];
  if (type !== undefined && exempt.some((t) => isKindOf(ctx, type, t))) return true;
  return ctx.parentEdges(node.key).length === 0 && ctx.childEdges(node.key).length === 0;
}
