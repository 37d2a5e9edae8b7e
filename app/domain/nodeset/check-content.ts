/** What can be wrong with a file as a whole, once it is read: its models, and types that close a circle. */
import { OPC_UA_NAMESPACE, standardKey, type NodeKey } from "../address-space/node-id";
import { isTypeNode, type Node } from "../address-space/node";
import { StandardObject, StandardReferenceType } from "../address-space/standard-ids";
import { problem, type Problem } from "../core/result";
import type { ProblemList } from "./problem-list";
import type { NodeSetContent } from "./nodeset-content";

/** Adds problems; answers one when the content is of no use at all. */
export function checkContent(
  content: NodeSetContent,
  target: { readonly problems: ProblemList; readonly modelsAt: (index: number) => Problem["at"] },
): Problem | undefined {
  const { header, nodes } = content;
  const isBase = nodes.some((node) => node.key === StandardObject.RootFolder);
  if (header.models.length === 0 && header.namespaceUris.length === 0 && !isBase) {
    return problem("nodeset.no-namespace", undefined, { line: 1, column: 1 });
  }
  checkModels(content, target, isBase);
  for (const cycle of findTypeCycles(nodes)) {
    const data = { nodeId: cycle[0] ?? "", path: [...cycle, cycle[0]].join(" → ") };
    const key = cycle[0] ?? standardKey(0);
    target.problems.add(problem("nodeset.type-cycle", data, { ...content.lines.get(key), node: key }));
  }
  return undefined;
}

function checkModels(
  content: NodeSetContent,
  target: { readonly problems: ProblemList; readonly modelsAt: (index: number) => Problem["at"] },
  isBase: boolean,
): void {
  const { models, namespaceUris } = content.header;
  const first = models[0]?.modelUri ?? namespaceUris[0];
  if (models.length === 0 && first !== undefined) {
    target.problems.add(problem.warning("nodeset.no-model", { modelUri: first }, { line: 1, column: 1 }));
  }
  if (models.length > 1) {
    const uris = models.map((model) => model.modelUri).join(", ");
    const data = { count: models.length, models: uris, modelUri: first ?? "" };
    target.problems.add(problem.warning("nodeset.several-models", data, target.modelsAt(1)));
  }
  models.forEach((model, index) => {
    if (model.modelUri === OPC_UA_NAMESPACE) {
      const data = { modelUri: model.modelUri };
      if (!isBase) target.problems.add(problem("nodeset.own-namespace-zero", data, target.modelsAt(index)));
    } else if (!namespaceUris.includes(model.modelUri)) {
      const data = { modelUri: model.modelUri };
      target.problems.add(problem.warning("nodeset.namespace-missing", data, target.modelsAt(index)));
    }
  });
}

/** Circles of HasSubtype among the file's own declarations, each once, in the order subtype → supertype. */
function findTypeCycles(nodes: readonly Node[]): NodeKey[][] {
  const supertypes = new Map<NodeKey, NodeKey>();
  for (const node of nodes) {
    if (!isTypeNode(node)) continue;
    for (const reference of node.references) {
      if (reference.type !== StandardReferenceType.HasSubtype || reference.serverUri !== undefined) continue;
      const [subtype, supertype] = reference.isForward ? [reference.target, node.key] : [node.key, reference.target];
      if (!supertypes.has(subtype)) supertypes.set(subtype, supertype);
    }
  }
  const done = new Set<NodeKey>();
  const cycles: NodeKey[][] = [];
  for (const start of supertypes.keys()) {
    const path: NodeKey[] = [];
    const onPath = new Set<NodeKey>();
    let at: NodeKey | undefined = start;
    while (at !== undefined && !done.has(at) && !onPath.has(at)) {
      onPath.add(at);
      path.push(at);
      at = supertypes.get(at);
    }
    if (at !== undefined && onPath.has(at)) cycles.push(path.slice(path.indexOf(at)));
    for (const key of path) done.add(key);
  }
  return cycles;
}
