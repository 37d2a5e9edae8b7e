import { ChevronDown, ChevronRight } from "lucide-react";
import { memo } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { isTypeNode, type Node } from "~/domain/address-space/node";
import { isDescription } from "../model/cell-change";
import { getNodeName, isProperty } from "../model/member-facts";
import { useBadges, useMatesAmong } from "../model/use-model";
import { FerruleBadge } from "../notation/ferrule-badge";
import { FindingBadge } from "../notation/finding-badge";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import { cx } from "../ui/cx";
import { CellEditor } from "./cell-editor";
import { getCellText, type Column, type ColumnId } from "./columns";
import type { RegisterRow } from "./register-rows";
import { findSourceField, formatSourceField } from "./source-field";
import type { CellEdit, GridControl } from "./use-grid-control";

type Props = {
  space: AddressSpace;
  row: RegisterRow;
  node: Node;
  index: number;
  top: number;
  columns: readonly Column[];
  template: string;
  isSelected: boolean;
  activeColumn: ColumnId | undefined;
  editing: CellEdit | undefined;
  grid: GridControl;
};

/** One member. Only rows in sight exist, so a row reads its cells when it is drawn. */
export const RegisterRowView = memo(function RegisterRowView(props: Props) {
  const { space, row, node, index, top, columns, template, isSelected, activeColumn, editing, grid } = props;
  const mates = useMatesAmong([row.key]);
  const firstText = columns.find((column) => isDescription(column.id))?.id;
  const isOwner = node.nodeClass === "Object" || isTypeNode(node);
  return (
    <div
      role="row"
      className={cx("register-row", isOwner && "is-owner", isTypeNode(node) && "is-type", row.origin !== undefined && "is-inherited", isSelected && "is-selected", mates.size > 0 && "is-others")}
      style={{ transform: `translateY(${top}px)`, gridTemplateColumns: template }}
      aria-rowindex={index + 2}
      aria-level={row.level}
      aria-posinset={row.position}
      aria-setsize={row.siblings}
      aria-selected={isSelected}
      {...(row.isExpandable ? { "aria-expanded": row.isExpanded } : {})}
    >
      {columns.map((column, place) => {
        const isActive = activeColumn === column.id;
        return (
          <div
            key={column.id}
            id={isActive ? grid.activeId : undefined}
            role="gridcell"
            aria-colindex={place + 1}
            className={cx("register-cell", column.isMono && "is-mono", column.isRight && "is-right", getTone(column.id, node), isActive && "is-active", isActive && editing && "is-editing")}
            onClick={(event) => grid.onCellClick(event, row, column.id)}
            onDoubleClick={() => grid.startEdit({ rowId: row.id, column: column.id })}
          >
            {isActive && editing ? <CellEditor space={space} node={node} column={column} edit={editing} grid={grid} /> : <Cell {...{ space, row, node, column: column.id, grid, firstText }} />}
          </div>
        );
      })}
    </div>
  );
});

function getTone(column: ColumnId, node: Node): string {
  if (column === "type") return node.nodeClass === "Method" ? "is-words" : "is-type-name";
  return isDescription(column) || column === "rank" ? "is-words" : "";
}

type CellProps = { space: AddressSpace; row: RegisterRow; node: Node; column: ColumnId; grid: GridControl; firstText: ColumnId | undefined };

function Cell({ space, row, node, column, grid, firstText }: CellProps) {
  if (column === "name") return <NameCell space={space} row={row} node={node} grid={grid} />;
  if (column === "finding") return <FindingCell row={row} />;
  if (column === "source") return <SourceCell space={space} node={node} />;
  const text = getCellText(space, node, column);
  if (column === firstText && text === "" && row.origin !== undefined) return <span>from {getNodeName(space, row.origin)}</span>;
  return text === "" ? null : <span title={text.length > 14 ? text : undefined}>{text}</span>;
}

function NameCell({ space, row, node, grid }: { space: AddressSpace; row: RegisterRow; node: Node; grid: GridControl }) {
  const name = getCellText(space, node, "name");
  return (
    <span className="register-name" style={{ paddingLeft: (row.level - 1) * 16 }}>
      {row.isExpandable ? (
        <button type="button" className="register-twist" tabIndex={-1} aria-label={`${row.isExpanded ? "Close" : "Open"} ${name}`} onClick={() => grid.toggle(row.id)}>
          {row.isExpanded ? <ChevronDown size={13} aria-hidden /> : <ChevronRight size={13} aria-hidden />}
        </button>
      ) : (
        <i className="register-twist" />
      )}
      <NodeClassGlyph kind={isProperty(space, node) ? "Property" : node.nodeClass} label />
      <b>{name}</b>
    </span>
  );
}

function SourceCell({ space, node }: { space: AddressSpace; node: Node }) {
  const field = findSourceField(space, node);
  if (!field) return null;
  const text = formatSourceField(space, node);
  const title = field.exception === undefined ? text : `${text} (differs from its type: ${field.exception})`;
  return (
    <span className="register-source" title={title || undefined}>
      <FerruleBadge feed={field.feed} width={18} />
      <span>{field.exception === undefined ? text : `${text} *`}</span>
    </span>
  );
}

function FindingCell({ row }: { row: RegisterRow }) {
  const badge = useBadges([row.key]).get(row.key);
  return badge ? <FindingBadge severity={badge.severity} count={badge.count} title={badge.title} /> : null;
}
