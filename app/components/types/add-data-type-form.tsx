import { useState } from "react";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { addEnumeration } from "~/domain/editing/commands/add-enumeration";
import { addOptionSet, addStructure, type AddOptionSetIntent } from "~/domain/editing/commands/add-structure";
import { addType } from "~/domain/editing/commands/add-type";
import { AddForm, DescriptionField, NameField } from "../model/add-form-parts";
import type { EditStep } from "../model/edit-steps";
import { findTypes } from "../model/find-types";
import { parseEnumeration } from "../model/parse-enumeration";
import { TypeField } from "../model/type-search";
import { useOpenModel, useSpace } from "../model/use-model";
import { Checkbox, Field, Select, TextArea } from "../ui/field";
import { parseBitLines, parseFieldLines } from "./parse-data-type-lines";

const KINDS = ["Structure", "Union", "Enumeration", "Option set", "Simple"] as const;
type Kind = (typeof KINDS)[number];

const ROOTS: Readonly<Record<Kind, NodeKey>> = {
  Structure: StandardDataType.Structure,
  Union: StandardDataType.Union,
  Enumeration: StandardDataType.Enumeration,
  "Option set": StandardDataType.UInteger,
  Simple: StandardDataType.BaseDataType,
};

const LINES: Readonly<Record<Exclude<Kind, "Simple">, { label: string; hint: string }>> = {
  Structure: {
    label: "Fields, one a line",
    hint: "Speed Double, Names String[], or with ? when it may be left out: Note? String",
  },
  Union: { label: "Fields, one a line", hint: "Number Double, Text LocalizedText: a value holds one of them" },
  Enumeration: { label: "Values, one a line", hint: "Off, or with its number: 2 Running" },
  "Option set": { label: "Bits, one a line", hint: "Warm, or with its bit: 4 Worn" },
};

const SIZES: readonly { value: AddOptionSetIntent["size"]; label: string }[] = [
  { value: 8, label: "Byte, 8 bits" },
  { value: 16, label: "UInt16, 16 bits" },
  { value: 32, label: "UInt32, 32 bits" },
  { value: 64, label: "UInt64, 64 bits" },
  { value: "any", label: "OptionSet, with valid bits" },
];

type Props = { onDone: (name: string, closes: boolean, key: NodeKey) => void; initialKind?: Kind };

/** A DataType of any kind; its members are written as lines and edited in the table afterwards. Encodings come with it. */
export function AddDataTypeForm({ onDone, initialKind = "Structure" }: Props) {
  const { actions, view } = useOpenModel();
  const space = useSpace();
  const [kind, setKind] = useState<Kind>(initialKind);
  const [name, setName] = useState("");
  const [base, setBase] = useState<NodeKey>();
  const [isAbstract, setAbstract] = useState(false);
  const [size, setSize] = useState<AddOptionSetIntent["size"]>(16);
  const [text, setText] = useState("");
  const [description, setDescription] = useState("");
  const supertype = base ?? ROOTS[kind];
  const fields = parseFieldLines(text, (type) => findDataType(space, type));
  const reasons = kind === "Structure" || kind === "Union" ? fields.reasons : [];

  function makeStep(): EditStep {
    const shared = {
      name: name.trim(),
      ...(description.trim() === "" ? {} : { description: [{ text: description.trim() }] }),
    };
    return (current, context) => {
      switch (kind) {
        case "Structure":
        case "Union":
          return addStructure(current, context, {
            ...shared,
            fields: fields.items,
            supertype,
            isUnion: kind === "Union",
            isAbstract,
          });
        case "Enumeration":
          return addEnumeration(current, context, { ...shared, fields: parseEnumeration(text), supertype });
        case "Option set":
          return addOptionSet(current, context, { ...shared, bits: parseBitLines(text).items, size });
        case "Simple":
          return addType(current, context, { ...shared, supertype, isAbstract });
      }
    };
  }

  function add(): void {
    if (reasons.length > 0) return;
    const [made] = actions.apply("add-data-type", makeStep()) ?? [];
    if (made === undefined) return;
    view.reveal(made);
    onDone(name.trim(), true, made);
  }

  const lines = kind === "Simple" ? undefined : LINES[kind];
  return (
    <AddForm onSubmit={add} label={`Add ${kind === "Simple" ? "simple type" : kind.toLowerCase()}`}>
      <NameField value={name} onChange={setName} />
      <Field label="Kind">
        {(control) => (
          <Select
            {...control}
            size="small"
            value={kind}
            onChange={(event) => {
              setKind(event.currentTarget.value as Kind);
              setBase(undefined);
            }}
          >
            {KINDS.map((one) => (
              <option key={one}>{one}</option>
            ))}
          </Select>
        )}
      </Field>
      {kind === "Option set" ? (
        <Field label="Carried by">
          {(control) => (
            <Select
              {...control}
              size="small"
              value={String(size)}
              onChange={(event) =>
                setSize(SIZES.find((s) => String(s.value) === event.currentTarget.value)?.value ?? 16)
              }
            >
              {SIZES.map((one) => (
                <option key={one.label} value={String(one.value)}>
                  {one.label}
                </option>
              ))}
            </Select>
          )}
        </Field>
      ) : (
        <Field label="Base type">
          {({ id }) => (
            <TypeField
              id={id}
              label="Base type"
              space={space}
              kind="DataType"
              value={supertype}
              below={ROOTS[kind]}
              onPick={setBase}
            />
          )}
        </Field>
      )}
      {lines ? (
        <Field label={lines.label} hint={lines.hint} errors={reasons}>
          {(control) => (
            <TextArea
              {...control}
              rows={6}
              spellCheck={false}
              value={text}
              onChange={(event) => setText(event.currentTarget.value)}
            />
          )}
        </Field>
      ) : null}
      {kind === "Enumeration" || kind === "Option set" ? null : (
        <Checkbox
          label="Abstract"
          hint="a base for others: no values of its own, no encodings"
          checked={isAbstract}
          onChange={(event) => setAbstract(event.currentTarget.checked)}
        />
      )}
      <DescriptionField value={description} onChange={setDescription} />
    </AddForm>
  );
}

function findDataType(space: AddressSpace, name: string): NodeKey | undefined {
  const [hit] = findTypes(space, { kind: "DataType" }, name, 1);
  return hit && hit.name.toLowerCase() === name.toLowerCase() ? hit.key : undefined;
}
