import type { Node } from "../../address-space/node";
import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import { addReference, findSubject, notPossible } from "../fixes";
import { ok } from "../../core/result";
import { findModellingRule, findTypeDefinition, ofType } from "../lookups";
import { isPlaceholder } from "../members";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

const SOURCES = ["Object", "ObjectType", "Variable", "VariableType"];

export const r037: NodeRule = {
  id: "R037",
  title: "Every Variable hangs on its owner",
  severity: "error",
  clause: `${clause(3, "§5.6.3, §5.6.4, §7.25, §7.29")}, ${clause(6, "§F.2, §F.7")}`,
  priority: 1,
  concerns: ["Variable"],
  condition:
    "A Variable of PropertyType is the target of a HasProperty, any other of a HasComponent from an Object, an ObjectType, a DataVariable or a VariableType. Nodes for design tools and placeholders of nodes that live elsewhere are exempt.",
  why: "A Variable that is only organised belongs to nobody: servers do not create it with its object, and clients that browse components do not see it.",
  check(node, ctx, report) {
    if (node.nodeClass !== "Variable" || node.designToolOnly) return;
    const parents = ctx.parentEdges(node.key);
    const isTypedProperty = findTypeDefinition(ctx, node.key) === T.PropertyType;
    const wanted = isTypedProperty ? R.HasProperty : R.HasComponent;
    const owners = ofType(ctx, parents, wanted);
    if (owners.some((e) => isSource(ctx.node(e.source), isTypedProperty)) || isExempt(node, ctx)) return;
    // What hangs on a wrong kind of owner, or by the wrong one of the two references, is a finding of R029 to R036.
    if (ofType(ctx, parents, R.Aggregates).length > 0) return;
    const isPlace = isPlaceholder(findModellingRule(ctx, node.key)) && parents.length > 0;
    report({
      ...(isPlace ? { severity: "hint" } : {}),
      attribute: "references",
      message: `The Variable ${node.browseName.name} has no owner.`,
      facts: [
        `${ctx.nameOf(wanted)} references to it: ${owners.length}`,
        ...parents.map((e) => `${ctx.nameOf(e.type)} from ${ctx.describe(e.source)}`),
      ],
    });
  },
  fix: {
    label: "Make it a component, or a Property, of the node that organises it",
    apply(space, finding) {
      const node = findSubject(space, finding);
      const edges = node
        ? space.edgesTo(node.key).filter((e) => SOURCES.includes(space.getNode(e.source)?.nodeClass ?? ""))
        : [];
      const parent = edges.find((e) => e.type === R.Organizes)?.source;
      if (!node || parent === undefined) return notPossible(finding);
      const isProperty = space
        .edgesFrom(node.key)
        .some((e) => e.type === R.HasTypeDefinition && e.target === T.PropertyType);
      const organised = { kind: "removeReference", source: parent, type: R.Organizes, target: node.key } as const;
      return ok([organised, addReference(space, parent, isProperty ? R.HasProperty : R.HasComponent, node.key)]);
    },
  },
  examples: {
    good: { text: "A component of an Object.", build: (m) => m.variable("Speed", { parent: m.object("Pump1") }) },
    bad: {
      text: "A Variable that a folder organises and nobody owns.",
      build: (m) =>
        m.variable("Speed", { parent: m.object("Signals", { type: T.FolderType }), reference: R.Organizes }),
    },
  },
};

function isSource(node: Node | undefined, isTypedProperty: boolean): boolean {
  // A source that is not loaded is given the benefit of the doubt.
  return node === undefined || isTypedProperty || SOURCES.includes(node.nodeClass);
}

/** Descriptions of fields and allowed subtypes, and standard Properties that exist for their name only. */
function isExempt(node: Node, ctx: CheckContext): boolean {
  const parents = ctx.parentEdges(node.key);
  const special = [N.HasFieldDescription, N.AllowedSubtype].flatMap((t) => [...ctx.closure(t)]);
  if ([...parents, ...ctx.otherEdgesTo(node.key)].some((e) => special.includes(e.type))) return true;
  return (
    parents.length === 0 &&
    findTypeDefinition(ctx, node.key) === T.PropertyType &&
    node.browseName.namespaceUri !== "" &&
    isNameOnly(node)
  );
}

/** An unattached Property without ParentNodeId defines a name, as those of namespace 0 do. */
function isNameOnly(node: Node): boolean {
  return node.nodeClass === "Variable" && node.parent === undefined;
}
