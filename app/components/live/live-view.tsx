import { useCallback, useEffect, useRef, useState, type ReactNode } from "react";
import type { BrowsedNode } from "~/domain/live/live-node";
import type { LiveTarget } from "~/domain/live/live-target";
import { ActBlock } from "./act-block";
import { ColumnView } from "./column-view";
import { LiveBar } from "./live-bar";
import { LiveContext } from "./live-context";
import { LiveValues } from "./live-values";
import { PathWire } from "./path-wire";
import { OBJECTS_FOLDER, useLiveColumns } from "./use-live-columns";
import { useNodeCard } from "./use-node-card";
import { useLiveTarget } from "./use-live-target";
import { ValueCard } from "./value-card";
import { toWatched, useWatchList } from "./watch-list";
import { WatchStrip } from "./watch-strip";

type Props = {
  target: LiveTarget;
  startNode: string | null;
  /** The roles of whoever looks allow writes and calls. */
  mayWrite: boolean;
};

/** Live: columns to the right along the browse path, the value at their end, the watch strip below. */
export function LiveView({ target, startNode, mayWrite }: Props) {
  return (
    <LiveProvider serverId={target.id}>
      {(values) => <LiveStage initial={target} startNode={startNode} mayWrite={mayWrite} values={values} />}
    </LiveProvider>
  );
}

function LiveProvider({ serverId, children }: { serverId: string; children: (values: LiveValues) => ReactNode }) {
  const [values] = useState(() => new LiveValues(serverId));
  useEffect(() => values.open(), [values]);
  return <LiveContext value={values}>{children(values)}</LiveContext>;
}

const SUGGESTED = 5;

type StageProps = { initial: LiveTarget; startNode: string | null; mayWrite: boolean; values: LiveValues };

function LiveStage({ initial, startNode, mayWrite, values }: StageProps) {
  const target = useLiveTarget(initial);
  const [wanted, setWanted] = useState(startNode);
  const live = useLiveColumns(target.id, wanted);
  const selected = live.path.at(-1);
  const card = useNodeCard(target.id, selected);
  const watch = useWatchList(target.modelId ?? target.id);
  const stage = useRef<HTMLDivElement>(null);
  const scroller = useRef<HTMLDivElement>(null);

  useEffect(() => values.setServerRunning(target.isOpen), [values, target.isOpen]);
  useAddress(selected?.nodeId);
  useEffect(() => {
    scroller.current?.scrollTo({ left: scroller.current.scrollWidth, behavior: "instant" });
  }, [live.columns.length]);

  const lastColumn = live.columns.at(-1);
  useEffect(() => {
    const analog = (lastColumn?.children ?? []).filter((child) => child.range !== null).slice(0, SUGGESTED);
    if (analog.length > 1 && selected?.nodeClass === "Variable") watch.suggest(analog.map((node) => toWatched(node, live.path)));
  }, [lastColumn, selected, watch, live.path]);

  const toggleWatch = useCallback((node: BrowsedNode) => watch.toggle(toWatched(node, live.path)), [watch, live.path]);
  const focusColumn = (from: number, direction: -1 | 1): void => {
    const list = stage.current?.querySelector<HTMLElement>(`[data-column="${from + direction}"]`);
    const row = list?.querySelector<HTMLElement>('[aria-selected="true"]');
    const first = live.columns[from + direction]?.children[0];
    if (row) row.focus();
    else if (direction === 1 && first) {
      live.select(from + 1, first);
      requestAnimationFrame(() => list?.querySelector<HTMLElement>('[aria-selected="true"]')?.focus());
    }
  };

  return (
    <main id="main" tabIndex={-1} className="flex min-h-0 flex-1 flex-col outline-none max-md:overflow-y-auto">
      <h1 className="sr-only">Live: {target.name}</h1>
      <LiveBar target={target} values={values} />
      <Trail path={live.path} onGo={(length) => live.select(Math.max(0, length - 1), live.path[Math.max(0, length - 1)] as BrowsedNode)} />
      <div ref={stage} className="relative flex h-[min(446px,52%)] min-h-64 shrink-0 max-md:h-auto max-md:min-h-0 max-md:flex-col">
        <div ref={scroller} data-columns className="flex max-w-[64%] min-w-0 shrink-0 overflow-x-auto max-md:h-[300px] max-md:max-w-full">
          {live.columns.map((column, index) => (
            <ColumnView
              key={`${index} ${column.nodeId}`}
              column={column}
              index={index}
              selected={live.path[index]}
              isLast={index === live.columns.length - 1}
              onSelect={(node) => live.select(index, node)}
              onLoadMore={() => live.loadMore(index)}
              onRetry={live.retry}
              onLeave={(direction) => focusColumn(index, direction)}
              onWatch={toggleWatch}
            />
          ))}
        </div>
        <ValueCard
          node={selected}
          path={live.path}
          state={card}
          isWatched={selected !== undefined && watch.has(selected.nodeId)}
          onWatch={() => selected && toggleWatch(selected)}
          onOpenMember={(node) => live.select(live.path.length, node)}
          act={<ActBlock target={target} card={card.card} owner={live.path.at(-2)?.nodeId ?? OBJECTS_FOLDER} mayWrite={mayWrite} />}
        />
        <PathWire stage={stage} signature={live.path.map((node) => node.nodeId).join(" ")} />
      </div>
      <WatchStrip nodes={watch.nodes} selected={selected?.nodeId} onOpen={setWanted} onRemove={watch.remove} />
    </main>
  );
}

/** On a phone one column is shown; the trail leads back. */
function Trail({ path, onGo }: { path: readonly BrowsedNode[]; onGo: (length: number) => void }) {
  if (path.length === 0) return null;
  return (
    <nav aria-label="Path" className="flex shrink-0 items-center gap-1 overflow-x-auto border-b border-hair px-4 py-1.5 text-small md:hidden">
      {path.map((node, index) => (
        <button key={node.nodeId} type="button" onClick={() => onGo(index + 1)} className="shrink-0 text-copper">
          / {node.displayName}
        </button>
      ))}
    </nav>
  );
}

/** Keeps the address at the node, so that it can be sent to somebody; no navigation, nothing is loaded again. */
function useAddress(nodeId: string | undefined): void {
  useEffect(() => {
    if (nodeId === undefined) return;
    const url = new URL(location.href);
    url.searchParams.set("node", nodeId);
    history.replaceState(history.state, "", url);
  }, [nodeId]);
}
