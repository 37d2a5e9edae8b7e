import { useCallback, useEffect, useId, useMemo, useRef, useState, type ClipboardEvent, type KeyboardEvent, type MouseEvent } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { makeAddRequest, type AddRequest } from "../model/add-request";
import { findMemberOwner } from "../model/member-owner";
import { formatBlock, parseBlock } from "../model/cell-block";
import type { CellChange } from "../model/cell-change";
import { fitsInCell } from "../model/plain-value";
import { useOpenModel, useView } from "../model/use-model";
import { getCellText, getEditText, isEditable, type Column, type ColumnId } from "./columns";
import { listRowsBetween, moveCell, type GridCell, type Move } from "./grid-state";
import type { RegisterRow } from "./register-rows";

/** A cell in edit: what stood there, or the first key that was pressed on it. */
export type CellEdit = { readonly text: string; readonly replaces: boolean };

export type GridControl = {
  readonly activeId: string | undefined;
  readonly cell: GridCell | undefined;
  readonly editing: CellEdit | undefined;
  readonly toggle: (rowId: string) => void;
  readonly startEdit: (cell: GridCell, key?: string) => void;
  /** Ends the edit; the cursor then moves. */
  readonly endEdit: (move?: Move) => void;
  readonly onCellClick: (event: MouseEvent, row: RegisterRow, column: ColumnId) => void;
  readonly onKeyDown: (event: KeyboardEvent) => void;
  /** Gives the selected rows what the first of them has in the column of the cursor. */
  readonly fillDown: () => void;
  readonly onCopy: (event: ClipboardEvent) => void;
  readonly onPaste: (event: ClipboardEvent) => void;
};

type Inputs = {
  space: AddressSpace;
  rows: readonly RegisterRow[];
  columns: readonly Column[];
  toggle: (rowId: string) => void;
  scrollToIndex: (index: number) => void;
  add: (request: AddRequest) => void;
};

const MOVES: Readonly<Record<string, Move>> = {
  ArrowUp: "up",
  ArrowDown: "down",
  ArrowLeft: "left",
  ArrowRight: "right",
  Home: "first",
  End: "last",
  PageUp: "pageUp",
  PageDown: "pageDown",
};

/** Cursor, edit, selection and clipboard of the register. */
export function useGridControl(inputs: Inputs): GridControl {
  const { view, actions } = useOpenModel();
  const latest = useRef(inputs);
  latest.current = inputs;
  const [cell, setCell] = useState<GridCell>();
  const [editing, setEditing] = useState<CellEdit>();
  const anchor = useRef<string>(undefined);
  const baseId = useId();
  const revealed = useView((state) => state.revealed);

  const goTo = useCallback(
    (next: GridCell, extend = false) => {
      const { rows, scrollToIndex } = latest.current;
      setCell(next);
      const index = rows.findIndex((row) => row.id === next.rowId);
      const row = rows[index];
      if (!row) return;
      scrollToIndex(index);
      if (!extend) anchor.current = row.id;
      const chosen = extend && anchor.current !== undefined ? listRowsBetween(rows, anchor.current, row.id) : [row];
      const keys = [...new Set(chosen.map((r) => r.key))];
      view.select([...keys.filter((key) => key !== row.key), row.key]);
    },
    [view],
  );

  // The palette, a finding or the sheet asked for a node: its row becomes the cursor.
  useEffect(() => {
    const key = view.getState().selection.at(-1);
    const row = key === undefined ? undefined : latest.current.rows.find((r) => r.key === key);
    if (!row) return;
    setCell((old) => ({ rowId: row.id, column: old?.column ?? "name" }));
    latest.current.scrollToIndex(latest.current.rows.indexOf(row));
  }, [revealed, view]);

  const startEdit = useCallback(
    (at: GridCell, key?: string) => {
      const { space, rows } = latest.current;
      const row = rows.find((r) => r.id === at.rowId);
      const node = row && space.getNode(row.key);
      if (!node || !actions.mayChange(node.key) || !isEditable(node, at.column)) return;
      setCell(at);
      if (at.column === "value" && !fitsInCell(space, node)) {
        view.openValue(node.key);
        return;
      }
      setEditing({ text: key ?? getEditText(space, node, at.column), replaces: key !== undefined });
    },
    [actions, view],
  );

  const endEdit = useCallback(
    (move?: Move) => {
      setEditing(undefined);
      const { rows, columns } = latest.current;
      setCell((old) => (old && move ? moveCell(rows, columns, old, move) : old));
      document.querySelector<HTMLElement>(".register-grid")?.focus({ preventScroll: true });
    },
    [],
  );

  const onCellClick = useCallback(
    (event: MouseEvent, row: RegisterRow, column: ColumnId) => {
      if ((event.target as Element).closest("input, select, button")) return;
      const next = { rowId: row.id, column };
      setEditing(undefined);
      if (event.ctrlKey || event.metaKey) {
        view.toggle(row.key);
        setCell(next);
      } else goTo(next, event.shiftKey);
      view.setDrawerOpen(true);
    },
    [goTo, view],
  );

  const control = useMemo(() => {
    const find = (): { row: RegisterRow; column: ColumnId } | undefined => {
      const row = cell && latest.current.rows.find((r) => r.id === cell.rowId);
      return row && cell ? { row, column: cell.column } : undefined;
    };
    const listSelectedKeys = (): NodeKey[] => view.getState().selection.filter((key) => actions.mayChange(key));

    function fillDown(): void {
      const at = find();
      const { space, rows } = latest.current;
      const selected = new Set(view.getState().selection);
      const takes = ({ key }: RegisterRow): boolean => {
        const node = space.getNode(key);
        return node !== undefined && at !== undefined && isEditable(node, at.column);
      };
      const chosen = rows.filter((row) => selected.has(row.key) && takes(row));
      const first = chosen[0] && space.getNode(chosen[0].key);
      if (!at || !first || chosen.length < 2) return;
      const text = getCellText(space, first, at.column);
      actions.changeCells(chosen.slice(1).map((row) => ({ key: row.key, column: at.column, text })), "fill-down");
    }

    function clear(): void {
      const at = find();
      if (!at) return;
      if (at.column === "name") actions.remove(listSelectedKeys());
      else actions.changeCells(listSelectedKeys().map((key) => ({ key, column: at.column, text: "" })), "clear");
    }

    function moveInTree(event: KeyboardEvent): boolean {
      const at = find();
      if (!at || at.column !== "name" || event.ctrlKey) return false;
      if (event.key === "ArrowRight" && at.row.isExpandable && !at.row.isExpanded) latest.current.toggle(at.row.id);
      else if (event.key === "ArrowLeft" && at.row.isExpanded) latest.current.toggle(at.row.id);
      else if (event.key === "ArrowLeft" && at.row.parentId !== undefined) goTo({ rowId: at.row.parentId, column: "name" });
      else return false;
      return true;
    }

    function onCommandKey(event: KeyboardEvent): boolean {
      const { rows, columns, space } = latest.current;
      switch (event.key.toLowerCase()) {
        case "d":
          if (view.getState().selection.length > 1) fillDown();
          else actions.duplicate(listSelectedKeys());
          return true;
        case "a":
          view.select([...new Set(rows.map((row) => row.key))]);
          return true;
        case "home":
        case "end":
          if (cell) goTo(moveCell(rows, columns, cell, event.key === "Home" ? "top" : "bottom"), event.shiftKey);
          return true;
        case "enter": {
          const parent = findMemberOwner(space, view.getState().selection.at(-1));
          if (parent !== undefined && actions.canEdit) latest.current.add(makeAddRequest("Variable", { parent }));
          return true;
        }
        default:
          return false;
      }
    }

    function onKeyDown(event: KeyboardEvent): void {
      if ((event.target as Element).closest("input, select, textarea") || event.defaultPrevented) return;
      const { rows, columns } = latest.current;
      const first = rows[0];
      const at = cell ?? (first && { rowId: first.id, column: "name" as const });
      if (!at) return;
      if (event.ctrlKey || event.metaKey) {
        if (onCommandKey(event)) event.preventDefault();
        return;
      }
      if (event.altKey) return;
      const move = MOVES[event.key];
      if (move) {
        event.preventDefault();
        if (!moveInTree(event)) goTo(cell ? moveCell(rows, columns, at, move) : at, event.shiftKey && (move === "up" || move === "down"));
        return;
      }
      if (event.key === "Tab" && cell) {
        const next = moveCell(rows, columns, at, event.shiftKey ? "previous" : "next");
        // At either end Tab leaves the table, so that nobody is caught in it.
        if (next.rowId === at.rowId && next.column === at.column) return;
        event.preventDefault();
        goTo(next);
      } else if (event.key === "Enter" || event.key === "F2") startEdit(at);
      else if (event.key === "Delete") clear();
      else if (event.key === "Escape") view.select([]);
      else if (event.key.length === 1 && event.key !== " " && event.key !== "/") startEdit(at, event.key);
      else if (event.key === " " && find()) view.toggle((find() as { row: RegisterRow }).row.key);
      else return;
      event.preventDefault();
    }

    function onCopy(event: ClipboardEvent): void {
      const { space, rows, columns } = latest.current;
      if ((event.target as Element).closest("input") || editing) return;
      const selected = new Set(view.getState().selection);
      const chosen = rows.filter((row) => selected.has(row.key));
      const at = find();
      const shown = chosen.length === 1 && at ? columns.filter((column) => column.id === at.column) : columns;
      const block = chosen.map((row) => {
        const node = space.getNode(row.key);
        return shown.map((column) => (node ? getCellText(space, node, column.id) : ""));
      });
      event.clipboardData.setData("text/plain", formatBlock(block));
      actions.copyNodes([...selected]);
      event.preventDefault();
    }

    function onPaste(event: ClipboardEvent): void {
      if ((event.target as Element).closest("input") || editing) return;
      const at = find();
      const text = event.clipboardData.getData("text/plain");
      if (!at || text === "" || !actions.canEdit) return;
      event.preventDefault();
      const { rows, columns } = latest.current;
      const block = parseBlock(text);
      const firstRow = rows.indexOf(at.row);
      const firstColumn = columns.findIndex((column) => column.id === at.column);
      const changes: CellChange[] = block.flatMap((line, dy) =>
        line.flatMap((value, dx) => {
          const row = rows[firstRow + dy];
          const column = columns[firstColumn + dx];
          return row && column ? [{ key: row.key, column: column.id, text: value }] : [];
        }),
      );
      actions.changeCells(changes, "paste");
    }

    return {
      activeId: cell ? `${baseId}-active` : undefined,
      cell,
      editing,
      toggle: (rowId: string) => latest.current.toggle(rowId),
      startEdit,
      endEdit,
      onCellClick,
      onKeyDown,
      fillDown,
      onCopy,
      onPaste,
    };
  }, [cell, editing, startEdit, endEdit, onCellClick, goTo, view, actions, baseId]);

  return control;
}
