import { useRef, useState, type KeyboardEvent } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Node } from "~/domain/address-space/node";
import { RULE_KEYS, formatValueRank, VALUE_RANKS } from "../model/member-facts";
import { TypeSearch } from "../model/type-search";
import { UnitSearch } from "../model/unit-search";
import { useOpenModel } from "../model/use-model";
import { findUnitSymbol } from "../model/analog-facts";
import { isDescription } from "../model/cell-change";
import type { Column, ColumnId } from "./columns";
import type { CellEdit, GridControl } from "./use-grid-control";

type Props = { space: AddressSpace; node: Node; column: Column; edit: CellEdit; grid: GridControl };

const CHOICES: Readonly<Partial<Record<ColumnId, readonly string[]>>> = {
  rule: ["", ...Object.keys(RULE_KEYS)],
  rank: VALUE_RANKS.map(formatValueRank),
  access: ["R", "RW", "W", "RH", "RWH"],
};

/** The editor that fits the column, in the place of the cell. Enter takes and goes down, Tab takes and goes on, Esc leaves. */
export function CellEditor({ space, node, column: { id: column, title }, edit, grid }: Props) {
  const { actions } = useOpenModel();
  const label = `${title} of ${node.browseName.name}`;
  const take = (text: string): void => actions.changeCells([{ key: node.key, column, text }], `set-${column}`);

  if (column === "unit") {
    return (
      <UnitSearch
        label={label}
        initial={edit.text}
        onPick={(unit) => {
          actions.setUnit([node.key], unit);
          grid.endEdit("down");
        }}
        onCancel={() => grid.endEdit()}
      />
    );
  }
  if (column === "type" || column === "dataType") {
    const kind = column === "dataType" ? "DataType" : node.nodeClass === "Object" ? "ObjectType" : "VariableType";
    return (
      <TypeSearch
        label={label}
        space={space}
        kind={kind}
        initial={edit.replaces ? edit.text : ""}
        onPick={(type) => {
          if (column === "dataType") actions.setDataType([node.key], type);
          else actions.setTypeDefinition([node.key], type);
          grid.endEdit("down");
        }}
        onCancel={() => grid.endEdit()}
      />
    );
  }
  const choices = CHOICES[column];
  if (choices) return <ChoiceCell label={label} choices={choices} edit={edit} grid={grid} onTake={take} />;
  const isFigure = column === "range" || column === "value";
  const unit = isFigure && node.nodeClass === "Variable" ? findUnitSymbol(space, node.key) : "";
  return <TextCell label={label} edit={edit} grid={grid} onTake={take} column={column} unit={unit} />;
}

type CellProps = { label: string; edit: CellEdit; grid: GridControl; onTake: (text: string) => void };

/** A figure says its unit; one that is typed with another unit of the same quantity is converted. */
function TextCell({ label, edit, grid, onTake, column, unit }: CellProps & { column: ColumnId; unit: string }) {
  const isDone = useRef(false);

  function finish(text: string, move?: "down" | "next" | "previous"): void {
    if (isDone.current) return;
    isDone.current = true;
    if (text !== edit.text || edit.replaces) onTake(text);
    grid.endEdit(move);
  }

  const input = (
    <input
      autoFocus
      aria-label={unit === "" ? label : `${label} in ${unit}`}
      defaultValue={edit.text}
      placeholder={column === "range" ? "min … max" : undefined}
      spellCheck={isDescription(column)}
      autoComplete="off"
      onFocus={(event) => {
        if (!edit.replaces) event.currentTarget.select();
      }}
      onBlur={(event) => finish(event.currentTarget.value)}
      onKeyDown={(event: KeyboardEvent<HTMLInputElement>) => {
        event.stopPropagation();
        const text = event.currentTarget.value;
        if (event.key === "Enter") finish(text, "down");
        else if (event.key === "Tab") {
          event.preventDefault();
          finish(text, event.shiftKey ? "previous" : "next");
        } else if (event.key === "Escape") {
          isDone.current = true;
          grid.endEdit();
        }
      }}
    />
  );
  if (unit === "") return input;
  return (
    <span className="register-figure">
      {input}
      <i>{unit}</i>
    </span>
  );
}

function ChoiceCell({ label, choices, edit, grid, onTake }: CellProps & { choices: readonly string[] }) {
  const typed = edit.replaces ? choices.find((choice) => choice.toLowerCase().startsWith(edit.text.toLowerCase())) : undefined;
  const [value, setValue] = useState(typed ?? (edit.replaces ? (choices[0] ?? "") : edit.text));
  const isDone = useRef(false);

  function finish(move?: "down" | "next" | "previous"): void {
    if (isDone.current) return;
    isDone.current = true;
    if (value !== edit.text || edit.replaces) onTake(value);
    grid.endEdit(move);
  }

  return (
    <select
      autoFocus
      aria-label={label}
      value={value}
      onChange={(event) => setValue(event.currentTarget.value)}
      onBlur={() => finish()}
      onKeyDown={(event) => {
        event.stopPropagation();
        if (event.key === "Enter") finish("down");
        else if (event.key === "Tab") {
          event.preventDefault();
          finish(event.shiftKey ? "previous" : "next");
        } else if (event.key === "Escape") {
          isDone.current = true;
          grid.endEdit();
        }
      }}
    >
      {choices.map((choice) => (
        <option key={choice} value={choice}>
          {choice === "" ? "none" : choice}
        </option>
      ))}
    </select>
  );
}
