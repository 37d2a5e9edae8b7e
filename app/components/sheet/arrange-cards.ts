/** Automatic layout by elkjs, layered, in its own worker; loaded when it is asked for the first time. */
import type { ELK, ElkNode } from "elkjs/lib/elk-api";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Point } from "./sheet-geometry";
import type { Scene } from "./sheet-scene";

let engine: Promise<ELK> | undefined;

function loadEngine(): Promise<ELK> {
  engine ??= Promise.all([import("elkjs/lib/elk-api"), import("elkjs/lib/elk-worker.min.js?url")]).then(
    ([api, worker]) => new api.default({ workerFactory: () => new Worker(worker.default) }),
  );
  return engine;
}

const OPTIONS = {
  "elk.algorithm": "layered",
  "elk.direction": "RIGHT",
  "elk.edgeRouting": "ORTHOGONAL",
  "elk.layered.spacing.nodeNodeBetweenLayers": "96",
  "elk.spacing.nodeNode": "28",
  "elk.spacing.componentComponent": "56",
  "elk.layered.considerModelOrder.strategy": "NODES_AND_EDGES",
  "elk.layered.nodePlacement.strategy": "BRANDES_KOEPF",
};

/** New places for the cards. Supertypes stand left of their subtypes, owners left of their members. */
export async function arrangeCards(scene: Scene, keys: ReadonlySet<NodeKey>): Promise<Map<NodeKey, Point>> {
  const elk = await loadEngine();
  const graph: ElkNode = {
    id: "sheet",
    layoutOptions: OPTIONS,
    children: scene.cards.flatMap((card) => (keys.has(card.key) ? [{ id: card.key, width: card.width, height: card.height }] : [])),
    edges: scene.lines.flatMap((line) =>
      keys.has(line.edge.source) && keys.has(line.edge.target) && line.edge.source !== line.edge.target
        ? [{ id: line.id, sources: [line.edge.source], targets: [line.edge.target] }]
        : [],
    ),
  };
  const arranged = await elk.layout(graph);
  const places = new Map<NodeKey, Point>();
  for (const child of arranged.children ?? []) places.set(child.id as NodeKey, { x: Math.round(child.x ?? 0), y: Math.round(child.y ?? 0) });
  return places;
}
