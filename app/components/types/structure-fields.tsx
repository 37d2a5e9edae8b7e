import type { AddressSpace } from "~/domain/address-space/address-space";
import type { DataTypeField, DataTypeNode } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { findText } from "~/domain/address-space/qualified-name";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { setStructureFields, type StructureFieldIntent } from "~/domain/editing/commands/add-structure";
import { findFreeName } from "../drawer/argument-tables";
import { CommitField } from "../drawer/particular";
import { SmallTable } from "../drawer/small-table";
import { formatValueRank, getNodeName } from "../model/member-facts";
import { TypeField } from "../model/type-search";
import { Checkbox, Select } from "../ui/field";
import { withMoved } from "../values/value-draft";
import { listInheritedFields } from "./data-type-kind";
import type { DataTypeEdit } from "./use-data-type-edit";

type Props = { space: AddressSpace; node: DataTypeNode; isUnion: boolean; readOnly: boolean; edit: DataTypeEdit };

const COLUMNS = [
  { title: "Name", width: "15%" },
  { title: "DataType", width: "18%" },
  { title: "Rank", width: "15%" },
  { title: "Sizes", width: "7%" },
  { title: "Longest", width: "8%" },
  { title: "Optional", width: "52px" },
  { title: "Subtypes", width: "56px" },
  { title: "Description" },
];

/** Fields of a structure or union in their order, which is the order on the wire (OPC 10000-3 §8.48–8.50). */
export function StructureFieldsTable({ space, node, isUnion, readOnly, edit }: Props) {
  const fields = node.definition?.fields ?? [];
  const inherited = listInheritedFields(space, node.key);
  const set = (list: readonly StructureFieldIntent[], renamed?: ReadonlyMap<string, string>): void =>
    edit.edit(
      "set-fields",
      (current, context) => setStructureFields(current, context, { dataType: node.key, fields: list }),
      renamed,
    );
  const intents = fields.map(toIntent);

  function change(index: number, part: Partial<StructureFieldIntent>): void {
    const old = fields[index];
    const isRenamed = old !== undefined && part.name !== undefined && part.name !== old.name;
    const next = intents.map((field, i) =>
      i === index ? { ...field, ...part, ...(isRenamed ? { was: old.name } : {}) } : field,
    );
    set(next, isRenamed ? new Map([[part.name ?? "", old.name]]) : undefined);
  }
  function add(): void {
    const taken = [...fields, ...inherited.map(({ field }) => field)].map((field) => field.name);
    set([...intents, { name: findFreeName("Field", taken), dataType: StandardDataType.Double }]);
  }

  return (
    <SmallTable
      key={edit.turn}
      title={isUnion ? "One of these fields" : "Fields"}
      columns={isUnion ? COLUMNS.filter(({ title }) => title !== "Optional") : COLUMNS}
      rows={fields}
      readOnly={readOnly}
      nameOf={(field) => `field ${field.name}`}
      none="No fields of its own."
      addLabel="Field"
      onAdd={add}
      onRemove={(index) => set(intents.filter((_, i) => i !== index))}
      onMove={(index, by) => set(withMoved(intents, index, by))}
      before={
        inherited.length === 0
          ? undefined
          : inherited.map(({ field, origin }) => (
              <InheritedRow
                key={`${origin} ${field.name}`}
                space={space}
                field={field}
                origin={origin}
                columns={isUnion ? 7 : 8}
                hasTools={!readOnly}
              />
            ))
      }
      cells={(field, index) => {
        const { name } = field;
        const rank = field.valueRank ?? -1;
        const cells = [
          <CommitField
            key="name"
            isBare
            mono
            label={`Name of field ${index + 1}`}
            value={name}
            readOnly={readOnly}
            onCommit={(text) => change(index, { name: text.trim() })}
          />,
          <TypeField
            key="type"
            label={`DataType of ${name}`}
            space={space}
            kind="DataType"
            value={field.dataType ?? StandardDataType.BaseDataType}
            readOnly={readOnly}
            onPick={(dataType) => change(index, { dataType })}
          />,
          <Select
            key="rank"
            size="small"
            aria-label={`Rank of ${name}`}
            value={rank}
            disabled={readOnly}
            onChange={(event) => change(index, withRank(Number(event.currentTarget.value)))}
          >
            {[...new Set([-1, 1, 2, 3, rank])].map((choice) => (
              <option key={choice} value={choice}>
                {formatValueRank(choice)}
              </option>
            ))}
          </Select>,
          <SizesField
            key="sizes"
            field={field}
            readOnly={readOnly || rank < 1}
            onChange={(sizes) => change(index, { arrayDimensions: sizes })}
          />,
          <NumberField
            key="longest"
            label={`Longest text of ${name}`}
            value={field.maxStringLength}
            readOnly={readOnly}
            onChange={(length) => change(index, { maxStringLength: length } as Partial<StructureFieldIntent>)}
          />,
          <Checkbox
            key="optional"
            label=""
            aria-label={`${name} is optional`}
            className="ml-2"
            checked={field.isOptional === true}
            disabled={readOnly}
            onChange={(event) => change(index, { isOptional: event.currentTarget.checked })}
          />,
          <Checkbox
            key="subtypes"
            label=""
            aria-label={`${name} allows subtypes`}
            className="ml-2"
            checked={field.allowSubTypes === true}
            disabled={readOnly}
            onChange={(event) => change(index, { allowSubTypes: event.currentTarget.checked })}
          />,
          <CommitField
            key="about"
            isBare
            label={`Description of ${name}`}
            value={findText(field.description ?? []) ?? ""}
            readOnly={readOnly}
            onCommit={(text) => change(index, { description: withFirstText(field, text) })}
          />,
        ];
        return isUnion ? cells.filter((cell) => cell.key !== "optional") : cells;
      }}
    />
  );
}

function toIntent(field: DataTypeField): StructureFieldIntent {
  const {
    name,
    dataType = StandardDataType.BaseDataType,
    valueRank,
    arrayDimensions,
    maxStringLength,
    isOptional,
    allowSubTypes,
    description,
  } = field;
  return {
    name,
    dataType,
    allowSubTypes: allowSubTypes === true,
    ...(valueRank === undefined ? {} : { valueRank }),
    ...(arrayDimensions === undefined || arrayDimensions === ""
      ? {}
      : { arrayDimensions: arrayDimensions.split(",").map(Number) }),
    ...(maxStringLength === undefined ? {} : { maxStringLength }),
    ...(isOptional === undefined ? {} : { isOptional }),
    ...(description ? { description } : {}),
  };
}

/** Sizes belong to a number of dimensions. */
function withRank(valueRank: number): Partial<StructureFieldIntent> {
  return { valueRank, ...(valueRank >= 1 ? { arrayDimensions: new Array<number>(valueRank).fill(0) } : {}) };
}

/** The first text changes, others stay; an empty one goes. */
export function withFirstText(
  { description = [] }: Pick<DataTypeField, "description">,
  text: string,
): NonNullable<DataTypeField["description"]> {
  const [first, ...others] = description;
  return text === "" ? others : [{ ...first, text }, ...others];
}

function SizesField({
  field,
  readOnly,
  onChange,
}: {
  field: DataTypeField;
  readOnly: boolean;
  onChange: (sizes: readonly number[]) => void;
}) {
  return (
    <CommitField
      isBare
      mono
      label={`Sizes of ${field.name}`}
      value={field.valueRank !== undefined && field.valueRank >= 1 ? (field.arrayDimensions ?? "") : ""}
      placeholder={readOnly ? "" : "0"}
      readOnly={readOnly}
      onCommit={(text) => {
        const sizes = text.split(/[,×x ]+/).map(Number);
        if (
          sizes.length === field.valueRank &&
          sizes.every((size) => Number.isInteger(size) && size >= 0 && size <= 4_294_967_295)
        )
          onChange(sizes);
      }}
    />
  );
}

function NumberField({
  label,
  value,
  readOnly,
  onChange,
}: {
  label: string;
  value: number | undefined;
  readOnly: boolean;
  onChange: (value: number | undefined) => void;
}) {
  return (
    <CommitField
      isBare
      mono
      label={label}
      value={value === undefined ? "" : String(value)}
      readOnly={readOnly}
      onCommit={(text) => {
        if (text.trim() === "" || text.trim() === "0") onChange(undefined);
        else if (/^\d{1,10}$/.test(text.trim()) && Number(text) <= 4_294_967_295) onChange(Number(text));
      }}
    />
  );
}

function InheritedRow({
  space,
  field,
  origin,
  columns,
  hasTools,
}: {
  space: AddressSpace;
  field: DataTypeField;
  origin: NodeKey;
  columns: number;
  hasTools: boolean;
}) {
  return (
    <tr className="text-ink-3">
      <td className="px-2! font-mono">{field.name}</td>
      <td className="px-2! font-mono">{getNodeName(space, field.dataType)}</td>
      <td className="px-2!">{formatValueRank(field.valueRank ?? -1)}</td>
      <td colSpan={columns - 3 + (hasTools ? 1 : 0)} className="px-2!">
        from <em>{getNodeName(space, origin)}</em>
      </td>
    </tr>
  );
}
