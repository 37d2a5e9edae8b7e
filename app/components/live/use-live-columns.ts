/** The columns along the browse path: what is open, what is being fetched, what the server answered. */
import { useCallback, useEffect, useRef, useState } from "react";
import type { BrowsedNode, BrowsedPage } from "~/domain/live/live-node";

export const OBJECTS_FOLDER = "i=85";

export type Column = {
  readonly nodeId: string;
  readonly title: string;
  /** Type definition, or the NodeId of the first column. */
  readonly about: string;
  readonly aboutIsType: boolean;
  readonly children: readonly BrowsedNode[];
  readonly continuation: string | null;
  readonly state: "loading" | "ready" | "failed";
  readonly problem: string | null;
};

export type LiveColumns = {
  readonly columns: readonly Column[];
  /** Selected node per column; the last one may be a leaf and then has no column of its own. */
  readonly path: readonly BrowsedNode[];
  readonly select: (column: number, node: BrowsedNode) => void;
  readonly loadMore: (column: number) => void;
  readonly retry: () => void;
};

type Store = ReadonlyMap<string, { page: BrowsedPage | null; problem: string | null }>;

/** @param startNode the node that the address names; the columns open down to it */
export function useLiveColumns(serverId: string, startNode: string | null): LiveColumns {
  const [pages, setPages] = useState<Store>(new Map());
  const [path, setPath] = useState<readonly BrowsedNode[]>([]);
  const [pending, setPending] = useState<readonly string[]>([]);
  const asked = useRef(new Set<string>());

  const load = useCallback(
    async (nodeId: string, continuation: string | null) => {
      const question = `${nodeId}\n${continuation ?? ""}`;
      if (asked.current.has(question)) return;
      asked.current.add(question);
      const answer = await fetchChildren(serverId, nodeId, continuation);
      if (answer.problem !== null) asked.current.delete(question);
      setPages((known) => new Map(known).set(nodeId, merge(known.get(nodeId)?.page ?? null, answer)));
    },
    [serverId],
  );

  useEffect(() => {
    if (startNode === null) return;
    let isCurrent = true;
    void fetchPath(serverId, startNode).then((found) => {
      if (isCurrent) setPending(found);
    });
    return () => {
      isCurrent = false;
    };
  }, [serverId, startNode]);

  // One column after the other as far as the address names them.
  useEffect(() => {
    const parent = path.at(-1)?.nodeId ?? OBJECTS_FOLDER;
    const [next, ...rest] = pending;
    const found = next === undefined ? undefined : pages.get(parent)?.page?.children.find((child) => child.nodeId === next);
    if (!found) return;
    setPending(rest);
    setPath([...path, found]);
  }, [pages, path, pending]);

  const open = [OBJECTS_FOLDER, ...path.filter(opensColumn).map((node) => node.nodeId)];
  const wanted = open.join("\n");
  useEffect(() => {
    for (const nodeId of wanted.split("\n")) void load(nodeId, null);
  }, [wanted, load]);

  const columns = open.map((nodeId, index) => toColumn(nodeId, path[index - 1], pages.get(nodeId)));
  return {
    columns,
    path,
    select: (column, node) => {
      setPending([]);
      setPath([...path.slice(0, column), node]);
    },
    loadMore: (column) => {
      const { nodeId, continuation } = columns[column] ?? {};
      if (nodeId !== undefined && continuation) void load(nodeId, continuation);
    },
    retry: () => {
      const failed = columns.filter((column) => column.state === "failed");
      for (const { nodeId } of failed) void load(nodeId, null);
    },
  };
}

/** Methods and Variables end a path: what hangs below them is shown on their card. */
function opensColumn(node: BrowsedNode): boolean {
  return node.nodeClass !== "Method" && node.nodeClass !== "Variable";
}

function toColumn(nodeId: string, node: BrowsedNode | undefined, entry: { page: BrowsedPage | null; problem: string | null } | undefined): Column {
  return {
    nodeId,
    title: node?.displayName ?? "Objects",
    about: node ? (node.typeName ?? node.nodeClass) : OBJECTS_FOLDER,
    aboutIsType: typeof node?.typeName === "string",
    children: entry?.page?.children ?? [],
    continuation: entry?.page?.continuation ?? null,
    state: entry?.page ? "ready" : entry?.problem ? "failed" : "loading",
    problem: entry?.problem ?? null,
  };
}

/** Without the Objects folder, where every column begins; empty when no way down is found. */
async function fetchPath(serverId: string, nodeId: string): Promise<readonly string[]> {
  try {
    const answer = await fetch(`/live/${serverId}/path?${new URLSearchParams({ node: nodeId })}`);
    const { path } = answer.ok ? ((await answer.json()) as { path: string[] }) : { path: [] };
    return path.slice(1);
  } catch {
    return [];
  }
}

type Answer = { page: BrowsedPage | null; problem: string | null };

export async function fetchChildren(serverId: string, nodeId: string, continuation: string | null): Promise<Answer> {
  const search = new URLSearchParams({ node: nodeId, ...(continuation === null ? {} : { continuation }) });
  try {
    const answer = await fetch(`/live/${serverId}/children?${search}`);
    const body: unknown = await answer.json();
    if (answer.ok) return { page: body as BrowsedPage, problem: null };
    return { page: null, problem: (body as { detail?: string }).detail ?? "The server did not answer." };
  } catch {
    return { page: null, problem: "Ferrule does not answer." };
  }
}

function merge(known: BrowsedPage | null, { page, problem }: Answer): Answer {
  if (!page) return { page: known, problem };
  const have = new Set(known?.children.map((child) => child.nodeId));
  const fresh = page.children.filter((child) => !have.has(child.nodeId));
  return { page: { children: [...(known?.children ?? []), ...fresh], continuation: page.continuation }, problem: null };
}
