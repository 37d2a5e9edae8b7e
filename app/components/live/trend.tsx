import { useEffect, useRef } from "react";
import uPlot from "uplot";
import "uplot/dist/uPlot.min.css";
import type { LiveRange } from "~/domain/live/live-node";
import type { TrendPoint } from "./live-values";
import { useLiveValues } from "./live-context";

type Props = { nodeId: string; name: string; range: LiveRange | null; /** Seconds shown. */ span: number };

const HEIGHT = 38;
const REDRAW_INTERVAL = 500;

/** The past of one node, to the right is now. Bad is a hatched gap, a stopped stream a dotted line. */
export function Trend({ nodeId, name, range, span }: Props) {
  const holder = useRef<HTMLDivElement>(null);
  const values = useLiveValues();
  useEffect(() => {
    const element = holder.current;
    if (!element) return undefined;
    const endTrend = values.keepTrend(nodeId);
    let plot = makePlot(element, range, span, () => values.stoppedAt);
    const redraw = (): void => {
      // While the stream stands still the axis does too, so that the end of the line stays in sight.
      const now = Date.now() / 1000;
      plot.setData(toColumns(values.getTrend(nodeId), now), false);
      plot.setScale("x", { min: now - span, max: now });
    };
    redraw();
    const timer = setInterval(redraw, REDRAW_INTERVAL);
    const sizes = new ResizeObserver(() => plot.setSize({ width: element.clientWidth, height: HEIGHT }));
    sizes.observe(element);
    const remake = (): void => {
      plot.destroy();
      plot = makePlot(element, range, span, () => values.stoppedAt);
      redraw();
    };
    const theme = new MutationObserver(remake);
    theme.observe(document.documentElement, { attributes: true, attributeFilter: ["data-theme"] });
    const system = matchMedia("(prefers-color-scheme: dark)");
    system.addEventListener("change", remake);
    return () => {
      clearInterval(timer);
      sizes.disconnect();
      theme.disconnect();
      system.removeEventListener("change", remake);
      plot.destroy();
      endTrend();
    };
  }, [values, nodeId, range, span]);
  return <div ref={holder} role="img" aria-label={`Trend of ${name}, last ${span / 60} min`} className="h-[38px] w-full min-w-0 overflow-hidden" />;
}

type Columns = [number[], (number | null)[], number[]];

/** Times in seconds, figures, and marks: 0 plain, 1 uncertain, 2 bad. The newest figure is carried on to now. */
function toColumns(points: readonly TrendPoint[], now: number): Columns {
  const columns: Columns = [[], [], []];
  const push = (at: number, value: number | null, mark: number): void => {
    columns[0].push(at);
    columns[1].push(value);
    columns[2].push(mark);
  };
  for (const point of points) push(point.at / 1000, point.value, toMark(point));
  const last = points.at(-1);
  if (last) push(Math.max(now, last.at / 1000 + 0.001), last.value, toMark(last));
  return columns;
}

/** That a simulated value is uncertain stands on the page; hatching every trend with it would hide what differs. */
function toMark({ severity, isSimulated }: TrendPoint): number {
  if (severity === "bad") return 2;
  return severity === "uncertain" && !isSimulated ? 1 : 0;
}

function makePlot(element: HTMLElement, range: LiveRange | null, span: number, stoppedAt: () => number | undefined): uPlot {
  const colour = (token: string): string => getComputedStyle(element).getPropertyValue(token).trim();
  const [ink, copper, stale, warning, error] = ["--ink", "--copper", "--stale", "--warning", "--error"].map(colour) as [string, string, string, string, string];
  const options: uPlot.Options = {
    width: Math.max(40, element.clientWidth),
    height: HEIGHT,
    padding: [4, 4, 4, 0],
    pxAlign: 0,
    cursor: { show: false },
    legend: { show: false },
    axes: [{ show: false }, { show: false }],
    scales: {
      x: { time: true, range: (_plot, min, max) => [min ?? 0, max ?? span] },
      y: { range: (_plot, min, max) => chooseScale(range, min, max) },
      mark: { range: [0, 2] },
    },
    series: [
      {},
      { stroke: ink, width: 1.25, pxAlign: 0, spanGaps: false, points: { show: false }, ...steps(range) },
      { show: false, scale: "mark" },
    ],
    hooks: {
      drawClear: [(plot) => hatchMarks(plot, warning, error)],
      draw: [(plot) => drawEnd(plot, copper, stale, stoppedAt())],
    },
  };
  return new uPlot(options, [[], [], []], element);
}

/** Values without a range are states and counts: they stay until they change. */
function steps(range: LiveRange | null): Pick<uPlot.Series, "paths"> {
  const stepped = uPlot.paths.stepped?.({ align: 1 });
  return range === null && stepped ? { paths: stepped } : {};
}

/** The whole EURange while the values use it, else what they span. */
function chooseScale(range: LiveRange | null, min: number | null, max: number | null): [number, number] {
  if (min === null || max === null) return range ? [range.low, range.high] : [0, 1];
  if (range && max - min > (range.high - range.low) * 0.08) return [Math.min(range.low, min), Math.max(range.high, max)];
  const room = Math.max((max - min) * 0.25, range ? (range.high - range.low) * 0.02 : Math.abs(max) * 0.01 + 0.5);
  return [min - room, max + room];
}

function hatchMarks(plot: uPlot, warning: string, error: string): void {
  const [times = [], , marks = []] = plot.data as unknown as Columns;
  const { ctx, bbox } = plot;
  for (let i = 0; i < marks.length; i++) {
    const mark = marks[i] ?? 0;
    if (mark === 0) continue;
    let end = i + 1;
    while (end < marks.length && marks[end] === mark) end++;
    const left = plot.valToPos(times[i] ?? 0, "x", true);
    const right = plot.valToPos(times[Math.min(end, times.length - 1)] ?? 0, "x", true);
    hatch(ctx, Math.max(bbox.left, left), bbox.top, Math.max(2, right - Math.max(bbox.left, left)), bbox.height, mark === 2 ? error : warning);
    i = end - 1;
  }
}

function hatch(ctx: CanvasRenderingContext2D, x: number, y: number, width: number, height: number, colour: string): void {
  ctx.save();
  ctx.beginPath();
  ctx.rect(x, y, width, height);
  ctx.clip();
  ctx.strokeStyle = colour;
  ctx.lineWidth = 1;
  ctx.beginPath();
  for (let at = x - height; at < x + width; at += 6) {
    ctx.moveTo(at, y + height);
    ctx.lineTo(at + height, y);
  }
  ctx.stroke();
  ctx.restore();
}

/** A dot where the line is now; a dotted line from where the stream stopped. */
function drawEnd(plot: uPlot, copper: string, stale: string, stoppedAt: number | undefined): void {
  const [times = [], figures = []] = plot.data as unknown as Columns;
  const last = figures.at(-1);
  const end = times.at(-1);
  if (last === null || last === undefined || end === undefined) return;
  const { ctx } = plot;
  const ratio = devicePixelRatio;
  const y = plot.valToPos(last, "y", true);
  const x = plot.valToPos(end, "x", true);
  ctx.save();
  if (stoppedAt !== undefined) {
    const from = plot.valToPos(Math.min(stoppedAt / 1000, end), "x", true);
    ctx.clearRect(from, y - 2 * ratio, x - from, 4 * ratio);
    ctx.strokeStyle = stale;
    ctx.setLineDash([2 * ratio, 4 * ratio]);
    ctx.lineWidth = ratio;
    ctx.beginPath();
    ctx.moveTo(from, y);
    ctx.lineTo(x, y);
    ctx.stroke();
  } else {
    ctx.fillStyle = copper;
    ctx.beginPath();
    ctx.arc(x, y, 2.5 * ratio, 0, 2 * Math.PI);
    ctx.fill();
  }
  ctx.restore();
}
