/**
 * A sheet as one picture: frame with zones, captions, cards, lines, title block. It needs no style sheet, so that the same
 * picture is printed and saved as a file. Always ink on paper.
 */
import type { CSSProperties, ReactNode } from "react";
import type { NodeKey } from "~/domain/address-space/node-id";
import { FerruleBadge } from "../notation/ferrule-badge";
import { isDashedLine, LineEndDefinitions, lineEndMarkerId } from "../notation/line-ends";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import { MONO, PictureFrame, TITLE_HEIGHT, type TitleFact } from "./picture-frame";
import { placeCaptions } from "./line-captions";
import { formatPathData, routeLines, type Route } from "./route-lines";
import { FOOT_HEIGHT, getBounds, HEAD_HEIGHT, ROW_HEIGHT, SHADOW, type Rect } from "./sheet-geometry";
import type { Caption } from "./sheet-layout";
import type { Card, MemberRow, Scene } from "./sheet-scene";

export type PictureFacts = {
  readonly scene: Scene;
  readonly rects: ReadonlyMap<NodeKey, Rect>;
  readonly captions: readonly Caption[];
  /** Name of the file without its ending. */
  readonly name: string;
  readonly title: readonly TitleFact[];
};

const MARGIN = 64;
const PREFIX = "picture-";
const SMALLEST = { width: 960, height: 560 };
const INK: Readonly<Record<string, string>> = {
  "--paper": "#fff",
  "--leaf": "#fff",
  "--ink": "#1a1c1e",
  "--ink-2": "#484c50",
  "--ink-3": "#64686c",
  "--edge": "#85827b",
  "--hair": "#e3dfd7",
  "--shade": "#cfcac0",
  "--copper": "#984914",
  fontFamily: "'Inter Variable', Inter, 'Helvetica Neue', Arial, sans-serif",
  fontSize: "12px",
};

/** Room that the whole takes, in the drawing's units. */
export function measurePicture({ rects, captions }: PictureFacts): Rect {
  const bounds = getBounds([...rects.values(), ...captions]) ?? { x: 0, y: 0, width: 0, height: 0 };
  const width = Math.max(SMALLEST.width, bounds.width + 2 * MARGIN);
  const height = Math.max(SMALLEST.height, bounds.height + 2 * MARGIN + TITLE_HEIGHT);
  return { x: Math.floor(bounds.x - MARGIN), y: Math.floor(bounds.y - MARGIN), width: Math.ceil(width), height: Math.ceil(height) };
}

export function SheetPicture({ facts, width, height }: { facts: PictureFacts; width?: string; height?: string }) {
  const { scene, rects, captions, title } = facts;
  const box = measurePicture(facts);
  const routes = routeLines(scene.lines, rects);
  return (
    <svg
      xmlns="http://www.w3.org/2000/svg"
      role="img"
      aria-label={`Sheet ${facts.name}`}
      viewBox={`${box.x} ${box.y} ${box.width} ${box.height}`}
      width={width ?? box.width}
      height={height ?? box.height}
      style={INK as CSSProperties}
    >
      <LineEndDefinitions prefix={PREFIX} />
      <rect x={box.x} y={box.y} width={box.width} height={box.height} fill="#fff" />
      <PictureFrame box={box} title={title} />
      {captions.map((caption) => (
        <CaptionPicture key={caption.id} caption={caption} />
      ))}
      {scene.cards.map((card) => {
        const rect = card.isType ? rects.get(card.key) : undefined;
        return rect ? <Outline key={card.key} shape={card.shape} rect={{ ...rect, x: rect.x + SHADOW, y: rect.y + SHADOW }} fill="var(--shade)" /> : null;
      })}
      {routes.map((route) => (
        <LinePicture key={route.line.id} route={route} />
      ))}
      {scene.cards.map((card) => {
        const rect = rects.get(card.key);
        return rect ? <CardPicture key={card.key} card={card} rect={rect} /> : null;
      })}
    </svg>
  );
}

function CaptionPicture({ caption: { x, y, width, height, text } }: { caption: Caption }) {
  return (
    <g>
      <rect x={x} y={y} width={width} height={height} fill="none" stroke="var(--ink-3)" strokeDasharray="5 4" />
      <text x={x + 10} y={y + 17} fontWeight="600" fill="var(--ink)">
        {text}
      </text>
    </g>
  );
}

function Outline({ shape, rect: { x, y, width, height }, ...look }: { shape: Card["shape"]; rect: Rect; fill: string; stroke?: string; strokeWidth?: number }) {
  const middle = y + height / 2;
  const [right, bottom] = [x + width, y + height];
  switch (shape) {
    case "oval":
      return <ellipse cx={x + width / 2} cy={middle} rx={width / 2} ry={height / 2} {...look} />;
    case "hexagon":
      return <path d={`M${x} ${middle}L${x + 20} ${y}H${right - 20}L${right} ${middle}L${right - 20} ${bottom}H${x + 20}z`} {...look} />;
    case "signpost":
      return <path d={`M${x} ${middle}L${x + 20} ${y}H${right}L${right - 20} ${middle}L${right} ${bottom}H${x + 20}z`} {...look} />;
    case "trapezium":
      return <path d={`M${x + 20} ${y}H${right - 20}L${right} ${bottom}H${x}z`} {...look} />;
    default:
      return <rect x={x} y={y} width={width} height={height} rx={shape === "variable" ? 9 : 0} {...look} />;
  }
}

function CardPicture({ card, rect }: { card: Card; rect: Rect }) {
  const isBox = card.shape === "card" || card.shape === "variable";
  const tone = card.isForeign ? "var(--edge)" : "var(--ink)";
  const hasRows = card.rows.length > 0 || card.folded > 0 || card.drawn > 0;
  const baseline = rect.y + (hasRows ? HEAD_HEIGHT / 2 : rect.height / 2) + 4.5;
  const label = card.isForeign ? `${card.namespaceLabel}  ` : "";
  return (
    <g>
      <Outline shape={card.shape} rect={rect} fill="var(--leaf)" stroke={tone} strokeWidth={1.5} />
      <text x={isBox ? rect.x + 10 : rect.x + rect.width / 2} y={baseline} fontSize="13.5" fontWeight="600" fill="var(--ink)" {...(isBox ? {} : { textAnchor: "middle" })}>
        {label === "" ? null : (
          <tspan fontSize="11" fontWeight="400" fontFamily={MONO} fill="var(--ink-3)" xmlSpace="preserve">
            {label}
          </tspan>
        )}
        <tspan {...(card.isType ? { fontStyle: "italic" } : {})}>{card.name}</tspan>
        {card.typeName === undefined ? null : (
          <tspan fontWeight="400" fill="var(--ink-2)">
            ::<tspan fontStyle="italic">{card.typeName}</tspan>
          </tspan>
        )}
      </text>
      {isBox && !card.isForeign ? <Note x={rect.x + rect.width - 10} y={baseline} text={card.idText} /> : null}
      {hasRows ? <path d={`M${rect.x} ${rect.y + HEAD_HEIGHT}h${rect.width}`} stroke={tone} /> : null}
      {card.rows.map((row, index) => (
        <RowPicture key={row.key} row={row} rect={{ ...rect, y: rect.y + HEAD_HEIGHT + index * ROW_HEIGHT }} isPale={card.isForeign} isLast={index === card.rows.length - 1 && card.folded + card.drawn === 0} />
      ))}
      {card.folded > 0 || card.drawn > 0 ? (
        <text x={rect.x + 10} y={rect.y + rect.height - FOOT_HEIGHT / 2 + 4} fontSize="11" fill="var(--ink-3)">
          {[card.drawn > 0 ? `${card.drawn} drawn beside this list` : "", card.folded > 0 ? `${card.folded} more` : ""].filter(Boolean).join(" · ")}
        </text>
      ) : null}
    </g>
  );
}

function RowPicture({ row, rect, isPale, isLast }: { row: MemberRow; rect: Rect; isPale: boolean; isLast: boolean }) {
  const baseline = rect.y + ROW_HEIGHT / 2 + 4;
  const tone = row.origin !== undefined ? "var(--ink-3)" : isPale ? "var(--ink-2)" : "var(--ink)";
  const right = rect.x + rect.width;
  return (
    <g>
      <g transform={`translate(${rect.x + 9} ${rect.y + 5})`} style={{ color: tone }}>
        <NodeClassGlyph kind={row.isProperty ? "Property" : row.nodeClass} />
      </g>
      <text x={rect.x + 36} y={baseline} fill={tone}>
        {row.name}
        {row.typeName === undefined ? null : (
          <tspan fill="var(--ink-2)">
            ::<tspan fontStyle="italic">{row.typeName}</tspan>
          </tspan>
        )}
      </text>
      {row.feed === undefined ? null : (
        <g transform={`translate(${right - 62} ${rect.y + 5})`} style={{ color: row.feed === "fed" ? "var(--copper)" : "var(--ink-3)" }}>
          <FerruleBadge feed={row.feed} />
        </g>
      )}
      <Note x={right - (row.feed === undefined ? 46 : 68)} y={baseline} text={row.origin === undefined ? `${row.dataType}${row.unit === "" ? "" : `  ${row.unit}`}` : `from ${row.origin}`} />
      <Note x={right - 9} y={baseline} text={row.cardinality} />
      {isLast ? null : <path d={`M${rect.x + 1} ${rect.y + ROW_HEIGHT}h${rect.width - 2}`} stroke="var(--hair)" />}
    </g>
  );
}

function Note({ x, y, text }: { x: number; y: number; text: string }): ReactNode {
  return text === "" ? null : (
    <text x={x} y={y} fontSize="11" fontFamily={MONO} fill="var(--ink-3)" textAnchor="end" xmlSpace="preserve">
      {text}
    </text>
  );
}

function LinePicture({ route: { line, points } }: { route: Route }) {
  const path = formatPathData(points);
  if (line.end === "leader") return <path d={path} fill="none" stroke="var(--ink-3)" strokeDasharray="1.5 3" />;
  const marker = `url(#${PREFIX}${lineEndMarkerId(line.end)})`;
  return (
    <g>
      <path d={path} fill="none" stroke="var(--ink)" markerEnd={marker} {...(line.end === "symmetric" ? { markerStart: marker } : {})} {...(isDashedLine(line.end) ? { strokeDasharray: "5 3.5" } : {})} />
      {placeCaptions(line, points).map((part) => (
        <text key={part.text} x={part.x} y={part.y} textAnchor={part.anchor} fontSize="11" fill="var(--ink-2)" stroke="#fff" strokeWidth="4" paintOrder="stroke" {...(part.isMono ? { fontFamily: MONO } : {})}>
          {part.text}
        </text>
      ))}
    </g>
  );
}
