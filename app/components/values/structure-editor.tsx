/** Structures field by field, unions as one of their fields, option sets as ticks, structures that are not known as XML. */
import { useMemo, useState, type ReactNode } from "react";
import type { NodeKey } from "~/domain/address-space/node-id";
import { findText } from "~/domain/address-space/qualified-name";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { listDirectSubtypes } from "~/domain/address-space/type-hierarchy";
import type { StructureField, StructureShape } from "~/domain/nodeset/values/data-type-shapes";
import type { RawStructure } from "~/domain/nodeset/values/variant";
import { getNodeName } from "../model/member-facts";
import { TypeSearch } from "../model/type-search";
import { Button } from "../ui/button";
import { cx } from "../ui/cx";
import { Checkbox, Select } from "../ui/field";
import { ByteBits } from "./bit-list";
import { makeField, makeStructure } from "~/domain/nodeset/values/initial-value";
import { NullButton } from "./leaf-controls";
import { TEXT_TYPES } from "./leaf-text";
import { findOptionBits } from "./option-bits";
import { RawBody } from "./raw-body";
import type { Draft, DraftStructure } from "./value-draft";
import { useValueForm, type LeafProps } from "./value-form";

type StructureProps = LeafProps & { dataType?: NodeKey | undefined; isFixed: boolean };

export function StructureEditor({ label, item, onChange, autoFocus, dataType, isFixed }: StructureProps) {
  const form = useValueForm();
  const value = item as DraftStructure | RawStructure | null;
  const base = dataType ?? StandardDataType.Structure;
  if (value === null) {
    const direct = makeStructure(form, base);
    return (
      <div className="flex flex-wrap items-center gap-2">
        <span className="font-mono text-note text-ink-3">null</span>
        {form.readOnly ? null : direct ? (
          <Button size="small" autoFocus={autoFocus ?? false} onClick={() => onChange(direct)}>
            New {getNodeName(form.space, base)}
          </Button>
        ) : null}
        {form.readOnly || isFixed ? null : (
          <ConcreteType label={label} below={base} onPick={(type) => onChange(makeStructure(form, type))} />
        )}
      </div>
    );
  }
  if (value.kind === "raw") return <RawBody label={label} value={value} dataType={base} onChange={onChange} />;
  const shape = form.types.findStructure(value.dataType);
  if (!shape) return <p className="text-small text-ink-3">Its DataType is not loaded.</p>;
  return (
    <fieldset className={cx("structure-value", isFlat(shape) && "is-flat")} aria-label={label}>
      <div className="flex min-h-6 flex-wrap items-center gap-2">
        <em className="text-small">{getNodeName(form.space, value.dataType)}</em>
        {isFixed || form.readOnly ? null : (
          <>
            <ConcreteType
              label={label}
              below={base}
              isChosen
              onPick={(type) => onChange(changeType(form, value, type))}
            />
            <NullButton label={label} item={item} onChange={onChange} empty={null} />
          </>
        )}
      </div>
      <StructureFields value={value} shape={shape} onChange={onChange} autoFocus={autoFocus ?? false} />
    </fieldset>
  );
}

/** Few fields of one figure or text each: in a list they stand side by side. */
function isFlat({ fields, isUnion }: StructureShape): boolean {
  const isShort = (field: StructureField): boolean =>
    field.valueRank === -1 &&
    field.builtInType !== undefined &&
    (TEXT_TYPES.has(field.builtInType) || field.builtInType === "Boolean");
  return !isUnion && fields.length > 0 && fields.length <= 4 && fields.every(isShort);
}

/** Fields that the other type has too are kept. */
function changeType(
  form: Parameters<typeof makeStructure>[0],
  value: DraftStructure,
  type: NodeKey,
): DraftStructure | null {
  const next = makeStructure(form, type);
  const shape = form.types.findStructure(type);
  if (!next || !shape || shape.isUnion) return next;
  const kept = shape.fields.flatMap((field) => {
    const old = value.fields[field.name];
    return old && old.type === field.builtInType ? [[field.name, old] as const] : [];
  });
  return { ...next, fields: { ...next.fields, ...Object.fromEntries(kept) } };
}

type ConcreteProps = { label: string; below: NodeKey; isChosen?: boolean; onPick: (type: NodeKey) => void };

/** The concrete types below the declared one; where one is chosen already, the search opens on demand. */
function ConcreteType({ label, below, isChosen = false, onPick }: ConcreteProps) {
  const { space } = useValueForm();
  const [isOpen, setOpen] = useState(!isChosen);
  const hasChoice = useMemo(() => listDirectSubtypes(space, below).length > 0, [space, below]);
  if (!hasChoice) return null;
  if (!isOpen) {
    return (
      <Button size="small" tone="bare" aria-label={`Change the type of ${label}`} onClick={() => setOpen(true)}>
        Change type
      </Button>
    );
  }
  return (
    <span className="w-60">
      <TypeSearch
        label={`Concrete type of ${label}`}
        space={space}
        kind="DataType"
        concreteOnly
        below={below}
        autoFocus={isChosen}
        placeholder={`Choose a type below ${getNodeName(space, below)}`}
        onPick={(type) => {
          setOpen(!isChosen);
          onPick(type);
        }}
        {...(isChosen ? { onCancel: () => setOpen(false) } : {})}
      />
    </span>
  );
}

type FieldsProps = {
  value: DraftStructure;
  shape: StructureShape;
  onChange: (value: DraftStructure) => void;
  autoFocus: boolean;
};

function StructureFields({ value, shape, onChange, autoFocus }: FieldsProps) {
  const form = useValueForm();
  const bits = useMemo(() => findOptionBits(form.space, value.dataType), [form.space, value.dataType]);
  if (bits) return <ByteBits value={value} bits={bits} onChange={onChange} />;
  if (shape.isUnion) return <UnionFields value={value} shape={shape} onChange={onChange} />;
  const set = (field: StructureField, draft: Draft | undefined): void => {
    const fields = shape.fields.flatMap((f) => {
      const next = f.name === field.name ? draft : value.fields[f.name];
      return next ? [[f.name, next] as const] : [];
    });
    onChange({ ...value, fields: Object.fromEntries(fields) });
  };
  if (shape.fields.length === 0) return <p className="text-note text-ink-3">This structure has no fields.</p>;
  return (
    <>
      {shape.fields.map((field, index) => {
        const draft = value.fields[field.name];
        return (
          <FieldRow
            key={field.name}
            field={field}
            isPresent={draft !== undefined}
            onSwitch={(on) => set(field, on ? makeField(form, field) : undefined)}
          >
            {draft ? (
              <FieldValue
                field={field}
                draft={draft}
                onChange={(next) => set(field, next)}
                autoFocus={autoFocus && index === 0}
              />
            ) : (
              <span className="text-note leading-6 text-ink-3">left out</span>
            )}
          </FieldRow>
        );
      })}
    </>
  );
}

function FieldValue({
  field,
  draft,
  onChange,
  autoFocus,
}: {
  field: StructureField;
  draft: Draft;
  onChange: (draft: Draft) => void;
  autoFocus?: boolean;
}) {
  const { Draft: DraftEditor, Item } = useValueForm();
  const shared = { label: field.name, dataType: field.dataType, autoFocus: autoFocus ?? false };
  // A field that carries a Variant is one Variant, whatever that holds.
  if (draft.type === "Variant" && draft.shape === "scalar")
    return <Item {...shared} type="Variant" item={draft.value} onChange={(value) => onChange({ ...draft, value })} />;
  return (
    <DraftEditor {...shared} draft={draft} onChange={onChange} valueRank={field.valueRank} isFixed={field.isInline} />
  );
}

type FieldRowProps = {
  field: StructureField;
  isPresent: boolean;
  onSwitch: (on: boolean) => void;
  children: ReactNode;
};

function FieldRow({ field, isPresent, onSwitch, children }: FieldRowProps) {
  const { space, readOnly } = useValueForm();
  const node = space.getNode(field.dataType);
  const about = findText(node?.description ?? []);
  return (
    <div className="field-row">
      <div className="flex min-h-6 min-w-0 items-center gap-1.5">
        {field.isOptional ? (
          <Checkbox
            aria-label={`${field.name} is present`}
            label={<span className="text-note text-ink-2">{field.name}</span>}
            checked={isPresent}
            disabled={readOnly}
            onChange={(event) => onSwitch(event.currentTarget.checked)}
          />
        ) : (
          <span className="truncate text-note text-ink-2" title={field.name}>
            {field.name}
          </span>
        )}
      </div>
      <div className="min-w-0">{children}</div>
      <code className="field-type" title={about}>
        {getNodeName(space, field.dataType)}
        {field.valueRank >= 1 ? `[${",".repeat(field.valueRank - 1)}]` : ""}
      </code>
    </div>
  );
}

/** One of the fields, or none (OPC 10000-3 §8.50). */
function UnionFields({ value, shape, onChange }: Omit<FieldsProps, "autoFocus">) {
  const form = useValueForm();
  const chosen = shape.fields.find((field) => value.fields[field.name] !== undefined);
  const draft = chosen && value.fields[chosen.name];
  return (
    <div className="field-row">
      <Select
        size="small"
        aria-label="Field of the union"
        value={chosen?.name ?? ""}
        disabled={form.readOnly}
        onChange={(event) => {
          const field = shape.fields.find((f) => f.name === event.currentTarget.value);
          onChange({ ...value, fields: field ? { [field.name]: makeField(form, field) } : {} });
        }}
      >
        <option value="">none of them</option>
        {shape.fields.map((field) => (
          <option key={field.name}>{field.name}</option>
        ))}
      </Select>
      <div className="min-w-0">
        {chosen && draft ? (
          <FieldValue
            key={chosen.name}
            field={chosen}
            draft={draft}
            onChange={(next) => onChange({ ...value, fields: { [chosen.name]: next } })}
          />
        ) : null}
      </div>
      <code className="field-type">{chosen ? getNodeName(form.space, chosen.dataType) : ""}</code>
    </div>
  );
}
