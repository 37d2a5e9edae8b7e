import type { NodeProps, Node as FlowNode } from "@xyflow/react";
import { memo, use, type ReactNode } from "react";
import { FerruleBadge } from "../notation/ferrule-badge";
import { FindingBadge } from "../notation/finding-badge";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import { cx } from "../ui/cx";
import { InlineName } from "../model/inline-name";
import { useBadges, useMatesAmong, useSelectedAmong, type Badge } from "../model/use-model";
import { FarContext } from "./far-context";
import type { Card, MemberRow } from "./sheet-scene";

export type CardFlowNode = FlowNode<{ card: Card }, "card">;

/** One node of the drawing in the standard's shape. Selection and badges come from their stores, so that a card is drawn anew only when it changed. */
export const CardNode = memo(function CardNode({ data }: NodeProps<CardFlowNode>) {
  const isFar = use(FarContext);
  return isFar ? <FarCard card={data.card} /> : <NearCard card={data.card} />;
});

/** Far away only names are read: nothing else is made, so that a thousand cards move like plain boxes. */
function FarCard({ card }: { card: Card }) {
  const selected = useSelectedAmong([card.key]);
  return (
    <div className={getCardClass(card, selected.has(card.key))} data-key={card.key} style={{ width: card.width, height: card.height }}>
      <CardShape card={card} />
      <span className="card-far">{card.name}</span>
    </div>
  );
}

function getCardClass(card: Card, isSelected: boolean): string {
  return cx("drawn-card", `is-${card.shape}`, card.isType && "is-type", card.isForeign && "is-foreign", isSelected && "is-selected");
}

function NearCard({ card }: { card: Card }) {
  const keys = [card.key, ...card.rows.map((row) => row.key)];
  const selected = useSelectedAmong(keys);
  const badges = useBadges(keys);
  const mates = useMatesAmong(keys);
  return (
    <div
      className={getCardClass(card, selected.has(card.key))}
      data-key={card.key}
      style={{ width: card.width, height: card.height }}
    >
      <CardShape card={card} />
      <MateFlag name={mates.get(card.key)} />
      <CardHead card={card} badge={badges.get(card.key)} />
      {card.rows.length === 0 ? null : (
        <ul className="card-rows" role="listbox" aria-label={`Members of ${card.name}`} aria-multiselectable="true">
          {card.rows.map((row) => (
            <CardRow key={row.key} row={row} isForeign={card.isForeign} isSelected={selected.has(row.key)} badge={badges.get(row.key)} mate={mates.get(row.key)} />
          ))}
        </ul>
      )}
      {card.folded > 0 || card.drawn > 0 ? <CardFoot card={card} /> : null}
    </div>
  );
}

/** Hexagon, signpost, oval and trapezium are drawn; rectangles are boxes. */
function CardShape({ card: { shape, width, height } }: { card: Card }) {
  const path = getShapePath(shape, width, height);
  if (path === undefined) return null;
  return (
    <svg className="card-shape" width={width} height={height} viewBox={`0 0 ${width} ${height}`} aria-hidden="true">
      {path}
    </svg>
  );
}

function getShapePath(shape: Card["shape"], width: number, height: number): ReactNode {
  const middle = height / 2;
  const inset = 20;
  switch (shape) {
    case "oval":
      return <ellipse cx={width / 2} cy={middle} rx={width / 2 - 1} ry={middle - 1} />;
    case "hexagon":
      return <path d={`M1 ${middle}L${inset} 1H${width - inset}L${width - 1} ${middle}L${width - inset} ${height - 1}H${inset}z`} />;
    case "signpost":
      return <path d={`M1 ${middle}L${inset} 1H${width - 1}L${width - inset} ${middle}L${width - 1} ${height - 1}H${inset}z`} />;
    case "trapezium":
      return <path d={`M${inset} 1H${width - inset}L${width - 1} ${height - 1}H1z`} />;
    default:
      return undefined;
  }
}

function CardHead({ card, badge }: { card: Card; badge: Badge | undefined }) {
  const isBox = card.shape === "card" || card.shape === "variable";
  return (
    <div className={cx("card-head", card.rows.length === 0 && card.folded === 0 && card.drawn === 0 && "is-alone")} title={card.nodeIdText}>
      {card.isForeign ? <span className="card-namespace">{card.namespaceLabel}</span> : null}
      <span className="card-name">
        <InlineName nodeKey={card.key} name={card.name} />
        {card.typeName === undefined ? null : (
          <span className="card-type">
            <i>::</i>
            <em>{card.typeName}</em>
          </span>
        )}
      </span>
      {card.isAbstract ? <span className="card-abstract">abstract</span> : null}
      {badge ? <FindingBadge severity={badge.severity} {...(badge.count > 1 ? { count: badge.count } : {})} title={badge.title} /> : null}
      {isBox && !card.isForeign ? <span className="card-id">{card.idText}</span> : null}
      {card.isForeign ? null : <span className="card-port" data-port={card.key} title="Drag to another node to make a reference" />}
    </div>
  );
}

/** Dashed edge and first name of a colleague who has this selected. */
function MateFlag({ name }: { name: string | undefined }) {
  return name === undefined ? null : (
    <span className="mate-flag">
      <b>{name.split(" ")[0]}</b>
    </span>
  );
}

type RowProps = { row: MemberRow; isForeign: boolean; isSelected: boolean; badge: Badge | undefined; mate: string | undefined };

const CardRow = memo(function CardRow({ row, isForeign, isSelected, badge, mate }: RowProps) {
  const isOwn = !isForeign && row.origin === undefined;
  return (
    <li
      className={cx("card-row", row.feed !== undefined && "has-feed", row.origin !== undefined && "is-inherited", isSelected && "is-selected")}
      role="option"
      aria-selected={isSelected}
      aria-label={getRowLabel(row, badge)}
      data-key={row.key}
    >
      <MateFlag name={mate} />
      <NodeClassGlyph kind={row.isProperty ? "Property" : row.nodeClass} />
      <span className="row-name">
        <InlineName nodeKey={row.key} name={row.name} />
        {row.typeName === undefined ? null : (
          <>
            <i>::</i>
            <em>{row.typeName}</em>
          </>
        )}
      </span>
      <span className="row-data">
        {row.origin === undefined ? (
          <>
            {row.dataType}
            {row.unit === "" ? null : <b>{row.unit}</b>}
          </>
        ) : (
          `from ${row.origin}`
        )}
      </span>
      <span className="row-badge">
        {badge ? <FindingBadge severity={badge.severity} {...(badge.count > 1 ? { count: badge.count } : {})} title={badge.title} /> : null}
      </span>
      {row.feed === undefined ? null : <FerruleBadge feed={row.feed} />}
      <span className="row-cardinality">{row.cardinality}</span>
      {isOwn ? <span className="card-port" data-port={row.key} /> : null}
    </li>
  );
});

function getRowLabel(row: MemberRow, badge: Badge | undefined): string {
  const parts = [row.name, row.isProperty ? "Property" : row.nodeClass];
  if (row.typeName) parts.push(row.typeName);
  if (row.dataType) parts.push(row.unit ? `${row.dataType} in ${row.unit}` : row.dataType);
  if (row.feed !== undefined) parts.push(row.feed === "open" ? "no source yet" : row.feed === "constant" ? "constant" : "fed by a source");
  if (row.cardinality) parts.push(`cardinality ${row.cardinality}`);
  if (row.origin) parts.push(`from ${row.origin}`);
  if (badge) parts.push(badge.title);
  return parts.join(", ");
}

function CardFoot({ card }: { card: Card }) {
  const listed = card.rows.length;
  const words = [
    card.drawn > 0 ? `${card.drawn} ${card.drawn === 1 ? "member" : "members"} drawn beside this list` : "",
    card.folded > 0 ? `${card.folded} more` : "",
  ].filter((word) => word !== "");
  return (
    <div className="card-foot">
      {card.folded > 0 ? (
        <button type="button" className="nodrag" data-unfold={card.key} aria-label={`Show ${card.folded} more members of ${card.name}`}>
          {words.join(" · ")}
        </button>
      ) : (
        <span>{words.join("")}</span>
      )}
      <span className="card-id">
        {listed + card.drawn} of {card.members}
      </span>
    </div>
  );
}
