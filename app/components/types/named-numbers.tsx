/** Enumerations and option sets: names for numbers, in two small tables. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { DataTypeField, DataTypeNode } from "~/domain/address-space/node";
import { findText } from "~/domain/address-space/qualified-name";
import { setEnumerationFields, type EnumerationField } from "~/domain/editing/commands/add-enumeration";
import { setOptionSetBits, type OptionSetBit } from "~/domain/editing/commands/add-structure";
import { findFreeName } from "../drawer/argument-tables";
import { CommitField } from "../drawer/particular";
import { SmallTable } from "../drawer/small-table";
import { withMoved } from "../values/value-draft";
import { withFirstText } from "./structure-fields";
import type { DataTypeEdit } from "./use-data-type-edit";

type Props = { space: AddressSpace; node: DataTypeNode; readOnly: boolean; edit: DataTypeEdit };

const VALUE_COLUMNS = [
  { title: "Value", width: "64px" },
  { title: "Name", width: "26%" },
  { title: "Text", width: "26%" },
  { title: "Description" },
];

/** Values of an enumeration with the texts that people read (OPC 10000-3 §8.14). */
export function EnumerationTable({ node, readOnly, edit }: Props) {
  const fields = node.definition?.fields ?? [];
  const intents = fields.map(toValue);
  const set = (list: readonly EnumerationField[]): void =>
    edit.edit("set-enumeration", (current, context) =>
      setEnumerationFields(current, context, { dataType: node.key, fields: list }),
    );
  const change = (index: number, part: Partial<EnumerationField>): void =>
    set(
      intents.map((field, i) =>
        i === index ? { ...field, ...part, ...(part.name === undefined ? {} : { was: field.name }) } : field,
      ),
    );

  function add(): void {
    const value = fields.reduce((highest, field) => Math.max(highest, field.value ?? -1), -1) + 1;
    set([
      ...intents,
      {
        name: findFreeName(
          `State${value}`,
          fields.map((field) => field.name),
        ),
        value,
      },
    ]);
  }

  return (
    <SmallTable
      key={edit.turn}
      title="Enumeration values"
      columns={VALUE_COLUMNS}
      rows={fields}
      readOnly={readOnly}
      nameOf={(field) => field.name}
      none="No values of its own."
      addLabel="Value"
      onAdd={add}
      onRemove={(index) => set(intents.filter((_, i) => i !== index))}
      onMove={(index, by) => set(withMoved(intents, index, by))}
      cells={(field, index) => [
        <NumberCell
          key="value"
          label={`Value of ${field.name}`}
          value={field.value ?? 0}
          readOnly={readOnly}
          onCommit={(value) => change(index, { value })}
        />,
        <CommitField
          key="name"
          isBare
          label={`Name of value ${field.value ?? 0}`}
          value={field.name}
          readOnly={readOnly}
          onCommit={(name) => change(index, { name: name.trim() })}
        />,
        <CommitField
          key="text"
          isBare
          label={`Text of ${field.name}`}
          value={findText(field.displayName ?? []) ?? ""}
          placeholder={field.name}
          readOnly={readOnly}
          onCommit={(text) =>
            change(index, { displayName: withFirstText({ description: field.displayName ?? [] }, text) })
          }
        />,
        <CommitField
          key="about"
          isBare
          label={`Description of ${field.name}`}
          value={findText(field.description ?? []) ?? ""}
          readOnly={readOnly}
          onCommit={(text) => change(index, { description: withFirstText(field, text) })}
        />,
      ]}
    />
  );
}

function toValue({ name, value = 0, displayName, description }: DataTypeField): EnumerationField {
  return {
    name,
    value,
    ...(displayName && displayName.length > 0 ? { displayName } : {}),
    ...(description && description.length > 0 ? { description } : {}),
  };
}

const BIT_COLUMNS = [{ title: "Bit", width: "64px" }, { title: "Name", width: "34%" }, { title: "Description" }];

/** Bits of an option set; bit 0 is the lowest (OPC 10000-3 §8.40). */
export function BitTable({ node, readOnly, edit }: Props) {
  const fields = node.definition?.fields ?? [];
  const intents = fields.map(({ name, value = 0, description }): OptionSetBit => ({
    name,
    bit: value,
    ...(description ? { description } : {}),
  }));
  const set = (list: readonly OptionSetBit[]): void =>
    edit.edit("set-bits", (current, context) => setOptionSetBits(current, context, { dataType: node.key, bits: list }));
  const change = (index: number, part: Partial<OptionSetBit>): void =>
    set(
      intents.map((bit, i) =>
        i === index ? { ...bit, ...part, ...(part.name === undefined ? {} : { was: bit.name }) } : bit,
      ),
    );

  function add(): void {
    const bit = fields.reduce((highest, field) => Math.max(highest, field.value ?? -1), -1) + 1;
    set([
      ...intents,
      {
        name: findFreeName(
          `Bit${bit}`,
          fields.map((field) => field.name),
        ),
        bit,
      },
    ]);
  }

  return (
    <SmallTable
      key={edit.turn}
      title="Bits"
      columns={BIT_COLUMNS}
      rows={fields}
      readOnly={readOnly}
      nameOf={(field) => field.name}
      none="No bits of its own."
      addLabel="Bit"
      onAdd={add}
      onRemove={(index) => set(intents.filter((_, i) => i !== index))}
      onMove={(index, by) => set(withMoved(intents, index, by))}
      cells={(field, index) => [
        <NumberCell
          key="bit"
          label={`Bit of ${field.name}`}
          value={field.value ?? 0}
          readOnly={readOnly}
          onCommit={(bit) => change(index, { bit })}
        />,
        <CommitField
          key="name"
          isBare
          label={`Name of bit ${field.value ?? 0}`}
          value={field.name}
          readOnly={readOnly}
          onCommit={(name) => change(index, { name: name.trim() })}
        />,
        <CommitField
          key="about"
          isBare
          label={`Description of ${field.name}`}
          value={findText(field.description ?? []) ?? ""}
          readOnly={readOnly}
          onCommit={(text) => change(index, { description: withFirstText(field, text) })}
        />,
      ]}
    />
  );
}

function NumberCell({
  label,
  value,
  readOnly,
  onCommit,
}: {
  label: string;
  value: number;
  readOnly: boolean;
  onCommit: (value: number) => void;
}) {
  return (
    <CommitField
      isBare
      mono
      label={label}
      value={String(value)}
      readOnly={readOnly}
      onCommit={(text) => {
        const number = Number(text.trim().replace("−", "-"));
        if (text.trim() !== "" && Number.isSafeInteger(number)) onCommit(number);
      }}
    />
  );
}
