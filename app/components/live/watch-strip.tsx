import { X } from "lucide-react";
import { useEffect, useState } from "react";
import { formatAge, formatRange } from "~/domain/live/format-live";
import { StatusBadge } from "../notation/status-badge";
import { IconButton } from "../ui/button";
import { cx } from "../ui/cx";
import { Segments } from "../ui/segments";
import { getAge } from "./live-values";
import { useLiveValue, useNow, useStream } from "./live-context";
import { nameStatus, showValue, toStatus } from "./show-value";
import { Trend } from "./trend";
import type { WatchedNode } from "./watch-list";

const SPANS = [
  { value: "60", label: "1" },
  { value: "300", label: "5" },
  { value: "1800", label: "30 min" },
] as const;
type Span = (typeof SPANS)[number]["value"];

const GRID = "grid grid-cols-[64px_minmax(120px,168px)_minmax(120px,1fr)_minmax(110px,140px)_minmax(120px,214px)_76px_28px] items-center gap-x-2 max-md:grid-cols-[minmax(0,1fr)_auto_28px]";

type Props = {
  nodes: readonly WatchedNode[];
  selected: string | undefined;
  onOpen: (nodeId: string) => void;
  onRemove: (nodeId: string) => void;
};

/** Nodes kept in sight: one row each, all on one axis of time. */
export function WatchStrip({ nodes, selected, onOpen, onRemove }: Props) {
  const [span, setSpan] = useState<Span>("60");
  return (
    <section aria-label="Watch strip" className="flex min-h-[92px] flex-1 flex-col border-t-[1.5px] border-ink bg-paper max-md:min-h-60 max-md:flex-none">
      <header className="flex h-[38px] shrink-0 items-center gap-2.5 border-b border-rule px-5 max-md:px-4">
        <b className="text-body font-semibold">Watch strip</b>
        <span className="text-note text-ink-3 max-sm:sr-only">last {Number(span) / 60} min</span>
        <Segments label="Time shown" options={SPANS} value={span} onChange={setSpan} />
        <Legend />
      </header>
      {nodes.length === 0 ? (
        <p className="m-4 border border-dashed border-edge p-4 text-center text-small text-ink-2">
          Keep values in sight here: choose a Variable and press W, or “On the watch strip” on its card.
        </p>
      ) : (
        <div className="min-h-0 flex-1 overflow-y-auto">
          <ul>
            {nodes.map((node) => (
              <WatchRow key={node.nodeId} node={node} span={Number(span)} isSelected={node.nodeId === selected} onOpen={onOpen} onRemove={onRemove} />
            ))}
          </ul>
          <TimeAxis span={Number(span)} />
        </div>
      )}
    </section>
  );
}

function Legend() {
  return (
    <div className="ml-auto flex items-center gap-3.5 text-note text-ink-3 max-lg:hidden">
      <span className="flex items-center gap-1.5">
        <Swatch className="text-warning" /> Uncertain
      </span>
      <span className="flex items-center gap-1.5">
        <Swatch className="text-error" /> Bad, no value
      </span>
      <span className="flex items-center gap-1.5">
        <svg width={20} height={9} aria-hidden className="text-stale">
          <path d="M0 4.5h20" stroke="currentColor" strokeDasharray="2 4" />
        </svg>
        stream stopped
      </span>
    </div>
  );
}

function Swatch({ className }: { className: string }) {
  return (
    <svg width={20} height={9} aria-hidden className={className}>
      <path d="m0 9 9-9M5 9l9-9M10 9l9-9M15 9l5-5" stroke="currentColor" />
    </svg>
  );
}

type RowProps = { node: WatchedNode; span: number; isSelected: boolean; onOpen: (nodeId: string) => void; onRemove: (nodeId: string) => void };

function WatchRow({ node, span, isSelected, onOpen, onRemove }: RowProps) {
  const value = useLiveValue(node.nodeId);
  const stream = useStream();
  const isStale = stream !== "running";
  const range = node.range;
  return (
    <li className={cx(GRID, "h-12 border-b border-hair px-5 text-[12.5px] max-md:h-auto max-md:py-2 max-md:px-4", isSelected && "bg-copper-wash", isStale && "text-stale")}>
      <span className="truncate font-mono text-ink-3 max-md:hidden">{node.owner}</span>
      <button type="button" onClick={() => onOpen(node.nodeId)} className="grid min-w-0 text-left leading-4 hover:text-copper">
        <b className={cx("truncate", isStale ? "font-medium" : "font-semibold")}>{node.name}</b>
        <span className="truncate font-mono text-note text-ink-3">{range ? formatRange(range, node.unit?.text) : (node.unit?.text ?? "")}</span>
      </button>
      <div className="min-w-0 border-x border-rule bg-leaf max-md:order-last max-md:col-span-full max-md:mt-1">
        <Trend nodeId={node.nodeId} name={node.name} range={range} span={span} />
      </div>
      <span className={cx("truncate text-right font-mono text-[17px]", isStale ? "font-normal" : "font-medium")}>
        {value ? showValue(value.sample, range) : "…"}
        {node.unit && value && value.sample.value !== null ? <small className="ml-1 text-note font-normal text-ink-3">{node.unit.text}</small> : null}
      </span>
      <span className="min-w-0 truncate pl-3 max-md:hidden">
        {value ? (
          <StatusBadge status={toStatus(value.sample, stream)}>
            <span className="font-mono">{nameStatus(value.sample, stream)}</span>
          </StatusBadge>
        ) : null}
      </span>
      <span className="text-right font-mono text-small text-ink-2 max-md:hidden">{value ? <Age nodeId={node.nodeId} /> : null}</span>
      <IconButton icon={X} label={`Take ${node.name} off the watch strip`} size="small" onClick={() => onRemove(node.nodeId)} />
    </li>
  );
}

function Age({ nodeId }: { nodeId: string }) {
  const value = useLiveValue(nodeId);
  const now = useNow(500);
  return value && now > 0 ? formatAge(getAge(value, now)) : null;
}

/** Ticks under all trends; the last one is now. */
function TimeAxis({ span }: { span: number }) {
  const now = useNow(1000);
  const [offset, setOffset] = useState(0);
  useEffect(() => setOffset(new Date().getTimezoneOffset() * 60), []);
  const step = span <= 60 ? 10 : span <= 300 ? 60 : 300;
  const end = now / 1000;
  const ticks: number[] = [];
  if (now > 0) for (let at = Math.ceil((end - span - offset) / step) * step + offset; at < end - span * 0.07; at += step) ticks.push(at);
  return (
    <div aria-hidden className={cx(GRID, "px-5 max-md:hidden")}>
      <div className="relative col-start-3 h-5 font-mono text-note text-ink-3">
        {ticks.map((at) => (
          <span key={at} className="absolute top-0 -translate-x-1/2 before:mx-auto before:block before:h-1 before:w-px before:bg-ink-3" style={{ left: `${((at - end + span) / span) * 100}%` }}>
            {new Date(at * 1000).toLocaleTimeString("en-GB", span <= 60 ? {} : { hour: "2-digit", minute: "2-digit" })}
          </span>
        ))}
        <span className="absolute top-0 right-0 before:ml-auto before:block before:h-1 before:w-px before:bg-ink-3">now</span>
      </div>
    </div>
  );
}
