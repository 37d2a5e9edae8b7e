import { memo } from "react";
import { isDashedLine, lineEndMarkerId } from "../notation/line-ends";
import { formatPathData, type Route } from "./route-lines";

type Props = { route: Route; isSelected: boolean; isLit: boolean; name: string; onSelect: (id: string) => void };

/** One reference: its way, its end after the standard's table, its name and its cardinality. */
export const ReferenceLine = memo(function ReferenceLine({ route, isSelected, isLit, name, onSelect }: Props) {
  const { line, points } = route;
  const path = formatPathData(points);
  const start = points[0];
  if (!start) return null;
  if (line.end === "leader") {
    return (
      <g className="reference is-leader">
        <path className="reference-line" d={path} />
        <circle className="leader-dot" cx={start.x} cy={start.y} r="2.5" />
      </g>
    );
  }
  const marker = `url(#${lineEndMarkerId(line.end, isSelected || isLit ? "copper" : "ink")})`;
  const className = `reference${isDashedLine(line.end) ? " is-dashed" : ""}${isSelected ? " is-selected" : ""}${isLit ? " is-lit" : ""}`;
  return (
    <g className={className}>
      <path className="reference-line" d={path} markerEnd={marker} {...(line.end === "symmetric" ? { markerStart: marker } : {})} />
      <Caption route={route} />
      <path
        className="reference-grip"
        d={path}
        role="button"
        aria-label={name}
        aria-pressed={isSelected}
        tabIndex={-1}
        onClick={(event) => {
          event.stopPropagation();
          onSelect(line.id);
        }}
      >
        <title>{name}</title>
      </path>
    </g>
  );
}, isSameLine);

function isSameLine(a: Props, b: Props): boolean {
  return (
    a.isSelected === b.isSelected &&
    a.isLit === b.isLit &&
    a.name === b.name &&
    a.onSelect === b.onSelect &&
    a.route.line.cardinality === b.route.line.cardinality &&
    a.route.line.label === b.route.line.label &&
    a.route.points.length === b.route.points.length &&
    a.route.points.every((point, index) => point.x === b.route.points[index]?.x && point.y === b.route.points[index]?.y)
  );
}

const AWAY: Readonly<Record<string, number>> = { component: 15, property: 18 };

/** Cardinality close to the target, the name behind it, both above the last stretch. */
function Caption({ route: { line, points } }: { route: Route }) {
  const last = points.at(-1);
  const before = points.at(-2);
  if (!last || !before || (line.label === undefined && line.cardinality === undefined)) return null;
  const isLevel = last.y === before.y;
  const sign = last.x > before.x ? -1 : 1;
  const anchor = isLevel && sign < 0 ? "end" : "start";
  const away = AWAY[line.end] ?? 18;
  const room = line.cardinality === undefined ? 0 : line.cardinality.length * 6.6 + 8;
  return (
    <>
      {line.cardinality === undefined ? null : (
        <text className="reference-cardinality" x={isLevel ? last.x + sign * away : last.x + 8} y={isLevel ? last.y - 6 : last.y - 14} textAnchor={anchor}>
          {line.cardinality}
        </text>
      )}
      {line.label === undefined ? null : (
        <text className="reference-name" x={isLevel ? last.x + sign * (away + room) : last.x + 8} y={isLevel ? last.y - 6 : (last.y + before.y) / 2 + 4} textAnchor={anchor}>
          {line.label}
        </text>
      )}
    </>
  );
}
