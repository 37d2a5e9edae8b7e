/** The control for one item by its type, and for a value by its shape. What values hold comes back here through the form's context. */
import { useMemo } from "react";
import type { BuiltInType } from "~/domain/nodeset/values/variant";
import { Button } from "../ui/button";
import { Select } from "../ui/field";
import { ArrayRows } from "./array-rows";
import { WordBits } from "./bit-list";
import { getCarrier, makeItem } from "~/domain/nodeset/values/initial-value";
import { BooleanLeaf, EnumerationLeaf, NullButton, TextLeaf } from "./leaf-controls";
import { TEXT_TYPES } from "./leaf-text";
import { MatrixGrid } from "./matrix-grid";
import { NodeIdLeaf } from "./node-id-leaf";
import { findOptionBits } from "./option-bits";
import { DataValueEditor, DiagnosticEditor } from "./record-editors";
import { listShapes, listTypesFor, mayStandAlone, withShape, withType, type Shape } from "./shapes";
import { StructureEditor } from "./structure-editor";
import { BytesLeaf, LocalizedTextLeaf, QualifiedNameLeaf, StatusLeaf, XmlLeaf } from "./text-controls";
import type { Draft, DraftItem } from "./value-draft";
import { useValueForm, type DraftProps, type ItemProps, type TypedDraftProps } from "./value-form";

export function ItemEditor({ type, dataType, isFixed, ...leaf }: ItemProps) {
  const { space, types } = useValueForm();
  const bits = useMemo(() => (dataType === undefined ? undefined : findOptionBits(space, dataType)), [space, dataType]);
  if (type === "Int32" && dataType !== undefined && types.findEnumerationNames(dataType))
    return <EnumerationLeaf {...leaf} dataType={dataType} />;
  if (bits && (typeof leaf.item === "number" || typeof leaf.item === "bigint"))
    return <WordBits {...leaf} bits={bits} />;
  if (TEXT_TYPES.has(type)) return <TextLeaf {...leaf} type={type} />;
  switch (type) {
    case "Boolean":
      return <BooleanLeaf {...leaf} />;
    case "ByteString":
      return <BytesLeaf {...leaf} />;
    case "XmlElement":
      return <XmlLeaf {...leaf} />;
    case "NodeId":
    case "ExpandedNodeId":
      return <NodeIdLeaf {...leaf} isExpanded={type === "ExpandedNodeId"} />;
    case "StatusCode":
      return <StatusLeaf {...leaf} />;
    case "QualifiedName":
      return <QualifiedNameLeaf {...leaf} />;
    case "LocalizedText":
      return <LocalizedTextLeaf {...leaf} />;
    case "ExtensionObject":
      return <StructureEditor {...leaf} dataType={dataType} isFixed={isFixed ?? false} />;
    case "DataValue":
      return <DataValueEditor {...leaf} />;
    case "DiagnosticInfo":
      return <DiagnosticEditor {...leaf} />;
    default:
      return <VariantEditor {...leaf} dataType={dataType} />;
  }
}

const SHAPE_WORDS: Readonly<Record<Shape, string>> = { scalar: "one value", array: "list", matrix: "matrix" };

/** A value of one type in one of its lawful shapes. */
export function DraftEditor({ label, id, draft, onChange, dataType, valueRank, isFixed, autoFocus }: DraftProps) {
  const form = useValueForm();
  const shapes = listShapes(valueRank, dataType);
  const make = (): DraftItem => makeItem(form, draft.type, dataType);
  const all = shapes.includes(draft.shape) ? shapes : [draft.shape, ...shapes];
  const item = { type: draft.type, dataType, isFixed: isFixed ?? false };
  return (
    <div className="grid min-w-0 gap-1">
      {all.length > 1 ? (
        <Select
          size="small"
          className="w-32!"
          aria-label={`Shape of ${label}`}
          value={draft.shape}
          disabled={form.readOnly}
          onChange={(event) => onChange(withShape(draft, event.currentTarget.value as Shape, make))}
        >
          {all.map((shape) => (
            <option key={shape} value={shape} disabled={shape === "scalar" && !mayStandAlone(draft.type)}>
              {SHAPE_WORDS[shape]}
            </option>
          ))}
        </Select>
      ) : null}
      {draft.shape === "scalar" ? (
        <ItemEditor
          {...item}
          label={label}
          {...(id === undefined ? {} : { id })}
          autoFocus={autoFocus ?? false}
          item={draft.value}
          onChange={(value) => onChange({ ...draft, value })}
        />
      ) : draft.shape === "array" ? (
        <ArrayRows
          label={label}
          type={draft.type}
          values={draft.values}
          onChange={(values) => onChange({ ...draft, values })}
          make={make}
          render={(row) => <ItemEditor {...item} {...row} />}
        />
      ) : (
        <MatrixGrid
          label={label}
          type={draft.type}
          values={draft.values}
          dimensions={draft.dimensions}
          rank={valueRank}
          onChange={(values, dimensions) => onChange({ ...draft, values, dimensions })}
          make={make}
          render={(cell) => <ItemEditor {...item} {...cell} />}
        />
      )}
    </div>
  );
}

/** A value whose built-in type may be chosen. */
export function TypedDraftEditor({ allowed, ...props }: TypedDraftProps) {
  const form = useValueForm();
  const { draft, onChange, label, dataType } = props;
  const offered = allowed.includes(draft.type) ? allowed : [draft.type, ...allowed];
  return (
    <div className="grid min-w-0 gap-1">
      {offered.length > 1 ? (
        <Select
          size="small"
          mono
          className="w-44!"
          aria-label={`Type of ${label}`}
          value={draft.type}
          disabled={form.readOnly}
          onChange={(event) => {
            const type = event.currentTarget.value as BuiltInType;
            const make = (): DraftItem => makeItem(form, type, dataType);
            const next = withType(draft, type, make);
            onChange(mayStandAlone(type) ? next : withShape(next, next.shape === "matrix" ? "matrix" : "array", make));
          }}
        >
          {offered.map((type) => (
            <option key={type}>{type}</option>
          ))}
        </Select>
      ) : null}
      <DraftEditor key={draft.type} {...props} />
    </div>
  );
}

function VariantEditor({ label, item, onChange, autoFocus, dataType }: Omit<ItemProps, "type">) {
  const form = useValueForm();
  const allowed = listTypesFor(dataType, dataType === undefined ? undefined : form.types.findBuiltInType(dataType));
  const draft = item as Draft | null;
  if (draft === null) {
    return (
      <span className="flex items-center gap-2">
        <span className="font-mono text-note text-ink-3">null</span>
        {form.readOnly ? null : (
          <Button
            size="small"
            autoFocus={autoFocus ?? false}
            aria-label={`Give ${label} a value`}
            onClick={() => {
              const type = dataType === undefined ? "String" : getCarrier(form, dataType);
              onChange({ type, shape: "scalar", value: makeItem(form, type, dataType) });
            }}
          >
            Give it a value
          </Button>
        )}
      </span>
    );
  }
  return (
    <div className="flex items-start gap-1">
      <div className="min-w-0 flex-1">
        <TypedDraftEditor
          label={label}
          draft={draft}
          onChange={onChange}
          allowed={allowed}
          dataType={dataType}
          valueRank={-2}
          autoFocus={autoFocus ?? false}
        />
      </div>
      <NullButton label={label} item={item} onChange={onChange} empty={null} />
    </div>
  );
}
