import { useVirtualizer } from "@tanstack/react-virtual";
import { useCallback, useDeferredValue, useMemo, useRef, useState } from "react";
import { useSearchParams } from "react-router";
import type { NodeKey } from "~/domain/address-space/node-id";
import { AddNodePanel } from "../model/add-node-panel";
import { makeAddRequest, type AddRequest } from "../model/add-request";
import { findMemberOwner } from "../model/member-owner";
import { useFindingTally, useOpenModel, useSelection, useSpace } from "../model/use-model";
import { Empty } from "../ui/empty";
import { Button } from "../ui/button";
import { BulkBar } from "./bulk-bar";
import type { ColumnId } from "./columns";
import { ColumnMenu } from "./column-menu";
import { NewMemberRow } from "./new-member-row";
import { RegisterHead } from "./register-head";
import { RegisterRowView } from "./register-row-view";
import { buildRows } from "./register-rows";
import { ReplacePanel } from "./replace-panel";
import { parseFilter } from "./row-filter";
import { makeRowOrder, type SortRule } from "./row-order";
import { RegisterTools, type RegisterFilter } from "./register-tools";
import { useGridControl } from "./use-grid-control";
import { useRegisterColumns } from "./use-register-columns";
import { useTreeShape } from "./use-tree-shape";
import "./register.css";

const ROW = 24;
const HEAD = 28;
const NO_FILTER: RegisterFilter = { text: "", withFindings: false, showInherited: true };

/** The model as a signal list: one row a member, edited in place. */
export function Register() {
  const { findings, actions } = useOpenModel();
  const space = useSpace();
  const selection = useSelection();
  const tally = useFindingTally();
  const scroller = useRef<HTMLDivElement>(null);
  const [filter, setFilter] = useState(NO_FILTER);
  const [toggled, setToggled] = useState<ReadonlySet<string>>(new Set());
  const [adding, setAdding] = useState<AddRequest>();
  const [sort, setSort] = useState<SortRule>();
  const [parameters, setParameters] = useSearchParams();
  const isReplacing = parameters.has("replace");
  const showReplace = useCallback(
    (isShown: boolean) =>
      setParameters(
        (old) => {
          if (isShown) old.set("replace", "");
          else old.delete("replace");
          return old;
        },
        { replace: true },
      ),
    [setParameters],
  );
  const { columns, template, width, choice } = useRegisterColumns(space);
  const newest = useRef(space);
  newest.current = space;

  const order = useMemo(
    () => sort && makeRowOrder(() => newest.current, sort, (key) => findings.getState().byNode.get(key)?.length ?? 0),
    [sort, findings],
  );

  const shape = useTreeShape(space);
  // What is typed into the filter is shown at once; a large model answers a moment later.
  const wanted = useDeferredValue(filter.text);

  const rows = useMemo(() => {
    const question = parseFilter(wanted, choice.all);
    const { byNode } = findings.getState();
    const isFiltering = question !== undefined || filter.withFindings;
    const matches = (key: NodeKey): boolean => {
      const node = space.getNode(key);
      if (!node || (filter.withFindings && !byNode.has(key))) return false;
      return question === undefined || question(space, node);
    };
    return buildRows(space, { toggled, showInherited: filter.showInherited, ...(isFiltering ? { matches } : {}), ...(order ? { order } : {}) });
    // A filter asks the contents; without one only the tree counts. The tally changes whenever the checker answered anew.
  }, [wanted.trim() === "" && !filter.withFindings ? shape : space, toggled, wanted, filter.withFindings, filter.showInherited, order, choice.all, findings, filter.withFindings ? tally : undefined]);

  const toggle = useCallback((id: string) => {
    setToggled((old) => {
      const next = new Set(old);
      if (!next.delete(id)) next.add(id);
      return next;
    });
  }, []);

  const virtual = useVirtualizer({
    count: rows.length,
    getScrollElement: () => scroller.current,
    estimateSize: () => ROW,
    overscan: 12,
    paddingStart: 0,
    scrollPaddingStart: HEAD,
    scrollPaddingEnd: ROW,
  });
  const grid = useGridControl({ space, rows, columns, toggle, scrollToIndex: (index) => virtual.scrollToIndex(index), add: setAdding });
  const selected = useMemo(() => new Set(selection), [selection]);
  const owner = findMemberOwner(space, selection.at(-1));

  return (
    <section className="register" aria-label="Register">
      <RegisterTools
        filter={filter}
        onFilter={setFilter}
        rowCount={rows.length}
        columns={<ColumnMenu choice={choice} sort={sort} onSort={setSort} />}
        onAdd={() => setAdding(makeAddRequest("Variable", owner === undefined ? {} : { parent: owner }))}
        onReplace={() => showReplace(true)}
        onLeave={() => scroller.current?.focus()}
      />
      {isReplacing ? (
        <ReplacePanel
          space={space}
          onClose={() => {
            showReplace(false);
            scroller.current?.focus();
          }}
        />
      ) : null}
      <div
        ref={scroller}
        className="register-grid"
        data-keyboard
        role="treegrid"
        aria-label="Members"
        aria-multiselectable="true"
        aria-readonly={!actions.canEdit}
        aria-rowcount={rows.length + 1}
        aria-colcount={columns.length}
        aria-activedescendant={grid.activeId}
        tabIndex={0}
        onKeyDown={grid.onKeyDown}
        onCopy={grid.onCopy}
        onPaste={grid.onPaste}
      >
        <RegisterHead columns={columns} template={template} width={width} sort={sort} onSort={(column) => setSort((old) => nextSort(old, column))} onWidth={choice.setWidth} />
        <div className="register-body" role="rowgroup" style={{ height: virtual.getTotalSize(), minWidth: width }}>
          {virtual.getVirtualItems().map((item) => {
            const row = rows[item.index];
            const node = row && space.getNode(row.key);
            if (!row || !node) return null;
            return (
              <RegisterRowView
                key={row.id}
                space={space}
                row={row}
                node={node}
                index={item.index}
                top={item.start}
                columns={columns}
                template={template}
                isSelected={selected.has(row.key)}
                activeColumn={grid.cell?.rowId === row.id ? grid.cell.column : undefined}
                editing={grid.cell?.rowId === row.id ? grid.editing : undefined}
                grid={grid}
              />
            );
          })}
        </div>
        {rows.length === 0 ? <NoRows isFiltering={filter.text !== "" || filter.withFindings} onAdd={() => setAdding(makeAddRequest("ObjectType"))} /> : null}
      </div>
      {actions.canEdit && owner !== undefined ? <NewMemberRow space={space} owner={owner} /> : null}
      {selection.length > 1 ? <BulkBar space={space} selection={selection} fill={{ column: columns.find((column) => column.id === grid.cell?.column)?.title, run: grid.fillDown }} /> : null}
      {adding ? <AddNodePanel key={adding.id} request={adding} onClose={() => setAdding(undefined)} /> : null}
    </section>
  );
}

/** A press on a head sorts upwards, the next one downwards, the third leaves the order of the model. */
function nextSort(old: SortRule | undefined, column: ColumnId): SortRule | undefined {
  if (old?.column !== column) return { column, isDescending: false };
  return old.isDescending ? undefined : { column, isDescending: true };
}

function NoRows({ isFiltering, onAdd }: { isFiltering: boolean; onAdd: () => void }) {
  if (isFiltering) return <p className="p-5 text-small text-ink-3">No member answers this filter.</p>;
  return (
    <div className="grid place-items-center p-10">
      <Empty title="The register is empty" action={<Button tone="main" onClick={onAdd}>Add the first type</Button>}>
        A model begins with an ObjectType: the kind of machine that it describes.
      </Empty>
    </div>
  );
}
