import { useEffect, useState } from "react";
import type { BrowsedNode, NodeCard } from "~/domain/live/live-node";
import { fetchChildren } from "./use-live-columns";

export type CardState = { readonly card: NodeCard | null; readonly members: readonly BrowsedNode[]; readonly problem: string | null };

const NOTHING: CardState = { card: null, members: [], problem: null };

/** Attributes of the node that the path ends at, and what hangs below it when it is a Variable or a Method. */
export function useNodeCard(serverId: string, node: BrowsedNode | undefined): CardState {
  const [state, setState] = useState<{ nodeId: string; answer: CardState } | null>(null);
  const nodeId = node?.nodeId;
  const hasMembers = node?.nodeClass === "Variable" || node?.nodeClass === "Method";
  useEffect(() => {
    if (nodeId === undefined) return undefined;
    const stop = new AbortController();
    void ask(serverId, nodeId, hasMembers, stop.signal).then((answer) => {
      if (!stop.signal.aborted) setState({ nodeId, answer });
    });
    return () => stop.abort();
  }, [serverId, nodeId, hasMembers]);
  return state && state.nodeId === nodeId ? state.answer : NOTHING;
}

async function ask(serverId: string, nodeId: string, hasMembers: boolean, signal: AbortSignal): Promise<CardState> {
  try {
    const answer = await fetch(`/live/${serverId}/node?${new URLSearchParams({ node: nodeId })}`, { signal });
    const body: unknown = await answer.json();
    if (!answer.ok) return { ...NOTHING, problem: (body as { detail?: string }).detail ?? "The server did not answer." };
    const below = hasMembers ? await fetchChildren(serverId, nodeId, null) : null;
    return { card: body as NodeCard, members: below?.page?.children ?? [], problem: null };
  } catch {
    return { ...NOTHING, problem: "Ferrule does not answer." };
  }
}
