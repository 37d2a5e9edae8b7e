import { lazy, Suspense } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getDataType, getValueRank, hasValueAttributes, type Node } from "~/domain/address-space/node";
import { findInstrumentRangeOf, findRangeOf, findUnitOf, formatNumber } from "../model/analog-facts";
import { formatValueRank, VALUE_RANKS } from "../model/member-facts";
import { TypeField } from "../model/type-search";
import { UnitField } from "../model/unit-search";
import { useOpenModel } from "../model/use-model";
import { Select } from "../ui/field";
import { ArgumentTables } from "./argument-tables";
import { MembersColumn } from "./members-column";
import { CommitField, Particular } from "./particular";
import { RangeDimension } from "./range-dimension";
import { ReferenceTypeColumn } from "./reference-type-column";
import { ValueRow } from "./value-row";

const DataTypeDesigner = lazy(() =>
  import("../types/data-type-designer").then((module) => ({ default: module.DataTypeDesigner })),
);

/** What the node carries: DataType, rank, unit and range of a Variable, arguments of a Method, fields of an enumeration. */
export function ValueColumn({
  space,
  node,
  readOnly,
  onOpenValue,
}: {
  space: AddressSpace;
  node: Node;
  readOnly: boolean;
  onOpenValue: () => void;
}) {
  if (node.nodeClass === "Method") return <ArgumentTables space={space} node={node} readOnly={readOnly} />;
  if (node.nodeClass === "DataType")
    return (
      <Suspense fallback={<section aria-label="DataType" />}>
        <DataTypeDesigner space={space} node={node} readOnly={readOnly} />
      </Suspense>
    );
  if (hasValueAttributes(node))
    return <VariableValue space={space} node={node} readOnly={readOnly} onOpenValue={onOpenValue} />;
  if (node.nodeClass === "ReferenceType") return <ReferenceTypeColumn node={node} readOnly={readOnly} />;
  return <MembersColumn space={space} node={node} readOnly={readOnly} />;
}

type VariableProps = {
  space: AddressSpace;
  node: Extract<Node, { nodeClass: "Variable" | "VariableType" }>;
  readOnly: boolean;
};

function VariableValue({ space, node, readOnly, onOpenValue }: VariableProps & { onOpenValue: () => void }) {
  const { actions } = useOpenModel();
  const isVariable = node.nodeClass === "Variable";
  const unit = isVariable ? findUnitOf(space, node.key) : undefined;
  return (
    <section aria-label="Value">
      <h3>Value</h3>
      <Particular label="DataType">
        {(id) => (
          <div className="particular-pair">
            <TypeField
              id={id}
              label="DataType"
              space={space}
              kind="DataType"
              value={getDataType(node)}
              readOnly={readOnly}
              onPick={(type) => actions.setDataType([node.key], type)}
            />
            <span className="w-26">
              <Select
                size="small"
                aria-label="Value rank"
                value={getValueRank(node)}
                disabled={readOnly}
                onChange={(event) =>
                  actions.changeCells(
                    [{ key: node.key, column: "rank", text: formatValueRank(Number(event.currentTarget.value)) }],
                    "set-rank",
                  )
                }
              >
                {[...new Set([...VALUE_RANKS, getValueRank(node)])].map((rank) => (
                  <option key={rank} value={rank}>
                    {formatValueRank(rank)}
                  </option>
                ))}
              </Select>
            </span>
          </div>
        )}
      </Particular>
      {isVariable ? (
        <Particular label="Unit">
          {(id) => (
            <UnitField
              id={id}
              label="Unit"
              value={unit}
              readOnly={readOnly}
              onPick={(picked) => actions.setUnit([node.key], picked)}
            />
          )}
        </Particular>
      ) : null}
      {isVariable ? <RangeRow space={space} node={node} readOnly={readOnly} /> : null}
      <Particular label="Value">
        {(id) => <ValueRow id={id} space={space} node={node} readOnly={readOnly} onOpen={onOpenValue} />}
      </Particular>
    </section>
  );
}

function RangeRow({ space, node, readOnly }: VariableProps) {
  const { actions } = useOpenModel();
  const range = findRangeOf(space, node.key);
  const low = range ? formatNumber(range.low) : "";
  const high = range ? formatNumber(range.high) : "";
  const set = (text: string): void => actions.changeCells([{ key: node.key, column: "range", text }], "set-range");
  const join = (nextLow: string, nextHigh: string): string =>
    nextLow === "" && nextHigh === "" ? "" : `${nextLow || "0"} … ${nextHigh || "100"}`;
  return (
    <>
      <Particular label="EURange">
        {(id) => (
          <div className="grid grid-cols-[1fr_auto_1fr] items-center gap-1.5">
            <CommitField
              id={id}
              mono
              value={low}
              readOnly={readOnly}
              placeholder="low"
              onCommit={(text) => set(join(text, high))}
            />
            <span className="text-ink-3">…</span>
            <CommitField
              label="EURange high"
              mono
              value={high}
              readOnly={readOnly}
              placeholder="high"
              onCommit={(text) => set(join(low, text))}
            />
          </div>
        )}
      </Particular>
      {range ? <RangeDimension range={range} instrument={findInstrumentRangeOf(space, node.key)} /> : null}
    </>
  );
}
