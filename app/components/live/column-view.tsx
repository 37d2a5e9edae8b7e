import { useEffect, useRef, type KeyboardEvent } from "react";
import { ChevronRight, Lock } from "lucide-react";
import type { BrowsedNode } from "~/domain/live/live-node";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import { StatusShape } from "../notation/status-badge";
import { Button } from "../ui/button";
import { cx } from "../ui/cx";
import { Icon } from "../ui/icon";
import { useLiveValue, useStream } from "./live-context";
import { nameStatus, showValue, toStatus } from "./show-value";
import type { Column } from "./use-live-columns";

type ColumnProps = {
  column: Column;
  index: number;
  selected: BrowsedNode | undefined;
  isLast: boolean;
  onSelect: (node: BrowsedNode) => void;
  onLoadMore: () => void;
  onRetry: () => void;
  /** Moves the keyboard one column to the left or right. */
  onLeave: (direction: -1 | 1) => void;
  onWatch: (node: BrowsedNode) => void;
};

export function ColumnView({ column, index, selected, isLast, onSelect, onLoadMore, onRetry, onLeave, onWatch }: ColumnProps) {
  const list = useRef<HTMLUListElement>(null);
  const move = useListKeys(column.children, selected, onSelect, list);
  const onKeyDown = (event: KeyboardEvent): void => {
    if (event.altKey || event.ctrlKey || event.metaKey) return;
    if (event.key === "ArrowRight" || event.key === "Enter") onLeave(1);
    else if (event.key === "ArrowLeft") onLeave(-1);
    else if (event.key === "w" && selected?.nodeClass === "Variable") onWatch(selected);
    else if (!move(event.key)) return;
    event.preventDefault();
  };
  return (
    <section
      aria-label={column.title}
      className={cx(
        "flex min-w-0 shrink-0 flex-col border-r border-rule",
        index === 0 ? "w-[184px]" : column.children.some((child) => child.nodeClass === "Variable") ? "w-[clamp(236px,20vw,280px)]" : "w-[clamp(160px,13vw,188px)]",
        isLast ? "max-md:w-full max-md:border-r-0" : "max-md:hidden",
      )}
    >
      <header className={cx("flex h-11 shrink-0 flex-col justify-center border-b border-hair bg-bench pr-3.5 leading-4", index === 0 ? "pl-5" : "pl-3.5")}>
        <b className="truncate text-body font-semibold">{column.title}</b>
        <span className={cx("truncate text-note text-ink-3", column.aboutIsType ? "italic" : "font-mono")}>{column.about}</span>
      </header>
      {column.state === "failed" ? (
        <div className="grid gap-2 p-3.5 text-small text-ink-2">
          <p>{column.problem}</p>
          <Button size="small" onClick={onRetry} className="justify-self-start">
            Try again
          </Button>
        </div>
      ) : null}
      {column.state === "loading" ? <p className="p-3.5 text-small text-ink-3">Asking the server…</p> : null}
      <ul
        ref={list}
        role="listbox"
        aria-label={`Members of ${column.title}`}
        tabIndex={selected || column.children.length === 0 ? -1 : 0}
        onKeyDown={onKeyDown}
        data-column={index}
        className="min-h-0 flex-1 overflow-y-auto py-1 outline-none focus-visible:shadow-[inset_0_0_0_2px_var(--copper)]"
      >
        {column.children.map((node) => (
          <Row key={node.nodeId} node={node} isFirst={index === 0} isSelected={node.nodeId === selected?.nodeId} onSelect={onSelect} />
        ))}
        {column.state === "ready" && column.children.length === 0 ? <li className="px-3.5 text-small leading-[27px] text-ink-3">Nothing below it</li> : null}
        {column.continuation === null ? null : (
          <li className="px-3.5 py-1">
            <Button size="small" onClick={onLoadMore}>
              More after {column.children.length}
            </Button>
          </li>
        )}
      </ul>
    </section>
  );
}

type RowProps = { node: BrowsedNode; isFirst: boolean; isSelected: boolean; onSelect: (node: BrowsedNode) => void };

function Row({ node, isFirst, isSelected, onSelect }: RowProps) {
  return (
    <li
      role="option"
      aria-selected={isSelected}
      tabIndex={isSelected ? 0 : -1}
      data-node={node.nodeId}
      onClick={(event) => {
        event.currentTarget.focus({ preventScroll: true });
        onSelect(node);
      }}
      className={cx(
        "flex h-[27px] cursor-pointer items-center gap-[7px] pr-4 text-[12.5px] whitespace-nowrap focus-visible:-outline-offset-2",
        isFirst ? "pl-5" : "pl-3.5",
        isSelected
          ? "bg-copper-wash font-semibold shadow-[inset_0_1px_0_var(--copper),inset_0_-1px_0_var(--copper)]"
          : "hover:bg-bench",
      )}
    >
      <NodeClassGlyph kind={node.isProperty ? "Property" : node.nodeClass} label />
      <span className="min-w-[38%] flex-1 truncate">{node.displayName}</span>
      {node.nodeClass === "Variable" ? <RowValue node={node} /> : null}
      {node.nodeClass === "Method" ? (
        <span title="Called from its card, behind a caution" className="text-ink-3">
          <Icon of={Lock} size={13} label="called from its card, behind a caution" />
        </span>
      ) : null}
      {node.nodeClass !== "Variable" && node.nodeClass !== "Method" && !isSelected ? (
        <span className="text-ink-3">
          <Icon of={ChevronRight} size={13} />
        </span>
      ) : null}
    </li>
  );
}

function RowValue({ node }: { node: BrowsedNode }) {
  const value = useLiveValue(node.nodeId);
  const stream = useStream();
  if (!value) return <span className="font-mono text-small font-normal text-ink-3">…</span>;
  const { sample } = value;
  const isStale = stream !== "running";
  return (
    <span className={cx("flex min-w-0 items-center gap-2 font-mono text-small font-normal", typeof sample.value === "string" ? "max-w-[32%]" : "max-w-[58%]", isStale && "text-stale")} title={nameStatus(sample, stream)}>
      <span className="truncate">
        {showValue(sample, node.range)}
        {node.unit && sample.value !== null ? <small className="ml-1 text-note text-ink-3">{node.unit.text}</small> : null}
      </span>
      <StatusShape status={toStatus(sample, stream)} />
      <span className="sr-only">{nameStatus(sample, stream)}</span>
    </span>
  );
}

const PAGE_STEP = 10;

/** Arrow keys, Home, End, page keys, and the first letters of a name; answers whether the key meant something. */
function useListKeys(
  nodes: readonly BrowsedNode[],
  selected: BrowsedNode | undefined,
  onSelect: (node: BrowsedNode) => void,
  list: { current: HTMLUListElement | null },
): (key: string) => boolean {
  const typed = useRef({ text: "", at: 0 });
  const wantsFocus = useRef(false);
  useEffect(() => {
    if (!wantsFocus.current) return;
    wantsFocus.current = false;
    const row = list.current?.querySelector<HTMLElement>('[aria-selected="true"]');
    row?.focus({ preventScroll: true });
    row?.scrollIntoView({ block: "nearest" });
  }, [selected, list]);
  const go = (index: number): boolean => {
    const node = nodes[Math.min(nodes.length - 1, Math.max(0, index))];
    if (!node) return false;
    wantsFocus.current = true;
    onSelect(node);
    return true;
  };
  return (key) => {
    const at = nodes.findIndex((node) => node.nodeId === selected?.nodeId);
    switch (key) {
      case "ArrowDown":
        return go(at + 1);
      case "ArrowUp":
        return go(at < 0 ? 0 : at - 1);
      case "PageDown":
        return go(at + PAGE_STEP);
      case "PageUp":
        return go(at - PAGE_STEP);
      case "Home":
        return go(0);
      case "End":
        return go(nodes.length - 1);
      default: {
        if (key.length !== 1 || key === " ") return false;
        const now = Date.now();
        const text = (now - typed.current.at < 700 ? typed.current.text : "") + key.toLowerCase();
        typed.current = { text, at: now };
        const found = nodes.findIndex((node) => node.displayName.toLowerCase().startsWith(text));
        return found >= 0 && go(found);
      }
    }
  };
}
