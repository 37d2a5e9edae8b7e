/** What breaks when a model stands on other versions of its required models than before. */
import { AddressSpace, type Layer } from "../address-space/address-space";
import { getPath } from "../address-space/browse";
import { getOwnNamespace } from "../address-space/model-header";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import type { Change, ChangeRating } from "./change";
import { compareModels } from "./compare-models";
import { findOwningType } from "./find-affected";
import { listMentions } from "./merge/merge-presence";

export type RetargetBreak = {
  /** The own node that uses what changed. */
  readonly key: NodeKey;
  readonly nodeId: string;
  readonly path: string;
  readonly modelUri: string;
  /** What it uses: the name of a node of the required model, or its NodeId where only that is known. */
  readonly uses: string;
  readonly kind: Change["kind"] | "gone";
  readonly rating: ChangeRating;
  readonly reason: string;
  readonly clause: string;
  readonly before: string | null;
  readonly after: string | null;
};

/** `required`: the layers that the model would stand on, namespace 0 first. Breaking ones come first. */
export function listRetargetBreaks(space: AddressSpace, required: readonly Layer[]): RetargetBreak[] {
  const changes = collectChanges(space, required);
  const next = space.withRequired(required);
  const breaks: RetargetBreak[] = [];
  for (const node of space.listOwnNodes()) {
    const about = { key: node.key, nodeId: formatNodeId(node.nodeId), path: getPath(space, node.key) };
    for (const used of new Set(listMentions(node))) {
      if (space.isOwn(used)) continue;
      const known = space.getNode(used);
      if (known && !next.getNode(used)) {
        breaks.push({
          ...about,
          modelUri: known.nodeId.namespaceUri,
          uses: known.browseName.name,
          kind: "gone",
          rating: "breaking",
          reason: "The other version does not have the node.",
          clause: "OPC 11030 §3.2.16",
          before: formatNodeId(known.nodeId),
          after: null,
        });
        continue;
      }
      for (const { change, modelUri } of changes.get(used) ?? []) {
        const { kind, rating, reason, clause, before, after, path } = change;
        breaks.push({ ...about, modelUri, uses: path, kind, rating, reason, clause, before, after });
      }
    }
  }
  return breaks.sort((a, b) => RANK[a.rating] - RANK[b.rating]);
}

const RANK: Readonly<Record<ChangeRating, number>> = { breaking: 0, additive: 1, neutral: 2 };

type Found = { readonly change: Change; readonly modelUri: string };

/** Changes of the required models that a user may feel: texts and additions that nobody has to follow are left out. */
function collectChanges(space: AddressSpace, required: readonly Layer[]): Map<NodeKey, Found[]> {
  const found = new Map<NodeKey, Found[]>();
  const old = space.layers.slice(0, -1);
  for (const [at, layer] of required.entries()) {
    const modelUri = getOwnNamespace(layer.header);
    const before = old.findIndex((l) => getOwnNamespace(l.header) === modelUri);
    const oldLayer = old[before];
    if (!oldLayer || oldLayer === layer) continue;
    const states = {
      before: AddressSpace.of(old.slice(0, before), oldLayer),
      after: AddressSpace.of(required.slice(0, at), layer),
    };
    for (const change of compareModels(states.before, states.after).changes) {
      if (change.rating !== "breaking" || change.key === undefined) continue;
      const side = states.before.isOwn(change.key) ? states.before : states.after;
      for (const key of new Set([change.key, findOwningType(side, change.key)])) {
        if (key !== undefined) found.set(key, [...(found.get(key) ?? []), { change, modelUri }]);
      }
    }
  }
  return found;
}
