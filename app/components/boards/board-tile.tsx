import { formatBound } from "~/domain/live/format-live";
import type { BoardTile, LampColour } from "~/domain/live/watch-board";
import { useLiveValue, useStream } from "../live/live-context";
import { nameStatus, showValue, toStatus } from "../live/show-value";
import { Trend } from "../live/trend";
import { StatusShape } from "../notation/status-badge";
import { cx } from "../ui/cx";

const TREND_SPAN = 300;

type Props = { tile: BoardTile; nodeId: string | null; isWall: boolean };

/** A value as a board shows it: a bar within its limits, a lamp with its word, or a figure; always with its status. */
export function BoardTileView({ tile, nodeId, isWall }: Props) {
  const live = useLiveValue(nodeId);
  const stream = useStream();
  const isStale = stream !== "running";
  const value = live?.sample.value;
  const text = nodeId === null ? "not at this machine" : live ? showValue(live.sample, tile.range) : "…";
  const hasValue = live !== undefined && value !== null && value !== undefined;
  const status = live ? toStatus(live.sample, stream) : "stale";
  return (
    <article aria-label={tile.title} className={cx("flex-1 border-t border-rule pt-1.5", isStale && "text-stale")}>
      <header className="flex items-baseline gap-2">
        <h3 className={cx("truncate text-ink-2", isWall ? "text-body" : "text-small")} title={tile.title}>
          {tile.title}
        </h3>
        <span className="ml-auto shrink-0" title={live ? nameStatus(live.sample, stream) : "no value yet"}>
          <StatusShape status={status} />
          <span className="sr-only">{live ? nameStatus(live.sample, stream) : "no value yet"}</span>
        </span>
      </header>
      <p className={cx("flex items-center gap-2 truncate font-mono", isWall ? "text-[34px] leading-11" : "text-[22px] leading-8", isStale ? "font-normal" : "font-medium", nodeId === null && "text-small text-ink-3")}>
        {tile.kind === "state" && hasValue ? <Lamp colour={tile.states.find((state) => state.value === Number(value))?.lamp ?? "white"} isStale={isStale} size={isWall ? 26 : 18} /> : null}
        <span className="truncate">{text}</span>
        {tile.unit && tile.unit !== "1" && hasValue ? <small className="text-note font-normal text-ink-3">{tile.unit}</small> : null}
      </p>
      {tile.kind === "bar" && tile.range ? <Bar range={tile.range} value={typeof value === "number" ? value : null} isStale={isStale} title={tile.title} unit={tile.unit} /> : null}
      {tile.hasTrend && nodeId !== null && !tile.isHidden ? <Trend nodeId={nodeId} name={tile.title} range={tile.range} span={TREND_SPAN} /> : null}
    </article>
  );
}

function Bar({ range, value, isStale, title, unit }: { range: { low: number; high: number }; value: number | null; isStale: boolean; title: string; unit: string }) {
  const share = value === null ? 0 : Math.min(1, Math.max(0, (value - range.low) / (range.high - range.low)));
  const isBeyond = value !== null && (value < range.low || value > range.high);
  return (
    <figure aria-label={`${title}: range ${formatBound(range.low)} to ${formatBound(range.high)} ${unit}${isBeyond ? ", the value lies beyond it" : ""}`}>
      <div className="h-[9px] border border-ink-2" aria-hidden>
        <div className={cx("h-full origin-left transition-transform duration-(--calm)", isStale ? "bg-stale" : isBeyond ? "bg-warning" : "bg-ink-2")} style={{ transform: `scaleX(${share})` }} />
      </div>
      <figcaption className="flex justify-between font-mono text-note text-ink-3" aria-hidden>
        <span>{formatBound(range.low)}</span>
        {isBeyond ? <span className="font-words text-warning">beyond its range</span> : null}
        <span>{formatBound(range.high)}</span>
      </figcaption>
    </figure>
  );
}

/** Shape besides colour, so that nobody needs to tell red from green: the nearer to danger, the fewer its corners. */
const SHAPES: Readonly<Record<LampColour, string>> = {
  red: "M8 1 15 14H1Z",
  yellow: "M8 1 15 8 8 15 1 8Z",
  green: "M8 1.5a6.5 6.5 0 1 0 0 13 6.5 6.5 0 0 0 0-13Z",
  blue: "M2 2h12v12H2Z",
  white: "M8 1.5a6.5 6.5 0 1 0 0 13 6.5 6.5 0 0 0 0-13Z",
};
const FILLS: Readonly<Record<LampColour, string>> = { red: "var(--lamp-red)", yellow: "var(--lamp-yellow)", green: "var(--lamp-green)", blue: "var(--lamp-blue)", white: "var(--leaf)" };

/** A signal lamp; what its colour means follows IEC 60073. */
function Lamp({ colour, isStale, size }: { colour: LampColour; isStale: boolean; size: number }) {
  return (
    <svg viewBox="0 0 16 16" width={size} height={size} role="img" aria-label={`${colour} lamp`} className="shrink-0">
      <path d={SHAPES[colour]} fill={isStale ? "none" : FILLS[colour]} stroke={isStale ? "var(--stale)" : "var(--ink)"} strokeWidth={1.2} strokeDasharray={isStale ? "2 2" : undefined} />
    </svg>
  );
}
