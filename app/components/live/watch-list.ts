/** What a person keeps on the watch strip of a model's servers; kept in this browser, by model, since NodeIds stay. */
import { useCallback, useEffect, useState } from "react";
import type { BrowsedNode, LiveRange, Unit } from "~/domain/live/live-node";

export type WatchedNode = {
  readonly nodeId: string;
  readonly name: string;
  /** The object that it belongs to, for machines of one type side by side. */
  readonly owner: string;
  readonly unit: Unit | null;
  readonly range: LiveRange | null;
};

export const WATCH_STRIP_LIMIT = 24;

export type WatchList = {
  readonly nodes: readonly WatchedNode[];
  readonly has: (nodeId: string) => boolean;
  readonly toggle: (node: WatchedNode) => void;
  readonly remove: (nodeId: string) => void;
  /** Puts nodes on a strip that nobody has touched yet. */
  readonly suggest: (nodes: readonly WatchedNode[]) => void;
};

export function useWatchList(modelId: string): WatchList {
  const key = `ferrule.watch.${modelId}`;
  const [nodes, setNodes] = useState<readonly WatchedNode[]>([]);
  const [isTouched, setTouched] = useState(true);
  useEffect(() => {
    const stored = readStored(key);
    setNodes(stored ?? []);
    setTouched(stored !== null);
  }, [key]);
  const save = useCallback(
    (change: (known: readonly WatchedNode[]) => readonly WatchedNode[]) => {
      setTouched(true);
      setNodes((known) => {
        const next = change(known);
        localStorage.setItem(key, JSON.stringify(next));
        return next;
      });
    },
    [key],
  );
  return {
    nodes,
    has: (nodeId) => nodes.some((node) => node.nodeId === nodeId),
    toggle: (node) =>
      save((known) => {
        if (known.some((other) => other.nodeId === node.nodeId)) return known.filter((other) => other.nodeId !== node.nodeId);
        return known.length < WATCH_STRIP_LIMIT ? [...known, node] : known;
      }),
    remove: (nodeId) => save((known) => known.filter((node) => node.nodeId !== nodeId)),
    suggest: (suggested) => {
      if (!isTouched && nodes.length === 0) setNodes(suggested);
    },
  };
}

export function toWatched(node: BrowsedNode, path: readonly BrowsedNode[]): WatchedNode {
  const machine = path.findLast((step) => step.nodeClass === "Object" && step.typeName !== "FolderType" && path.indexOf(step) < path.length - 2);
  const owner = machine ?? path.findLast((step) => step.nodeClass === "Object");
  return { nodeId: node.nodeId, name: node.displayName, owner: owner?.displayName ?? "", unit: node.unit, range: node.range };
}

function readStored(key: string): WatchedNode[] | null {
  try {
    const stored: unknown = JSON.parse(localStorage.getItem(key) ?? "null");
    return Array.isArray(stored) ? stored.filter(isWatchedNode).slice(0, WATCH_STRIP_LIMIT) : null;
  } catch {
    return null;
  }
}

function isWatchedNode(value: unknown): value is WatchedNode {
  return typeof value === "object" && value !== null && "nodeId" in value && typeof value.nodeId === "string" && "name" in value && typeof value.name === "string";
}
