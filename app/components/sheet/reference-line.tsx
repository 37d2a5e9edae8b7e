import { memo } from "react";
import { isDashedLine, lineEndMarkerId } from "../notation/line-ends";
import { placeCaptions } from "./line-captions";
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
      <Captions route={route} />
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

/** Name and cardinality. */
function Captions({ route: { line, points } }: { route: Route }) {
  return placeCaptions(line, points).map(({ text, x, y, anchor, isMono }) => (
    <text key={`${text} ${isMono}`} className={isMono ? "reference-cardinality" : "reference-name"} x={x} y={y} textAnchor={anchor}>
      {text}
    </text>
  ));
}
