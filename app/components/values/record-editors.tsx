/** DataValue and DiagnosticInfo: parts that may each be left out (OPC 10000-4 §7.11, §7.12). */
import type { ReactNode } from "react";
import type { BuiltInType } from "~/domain/nodeset/values/variant";
import { Button } from "../ui/button";
import { Checkbox } from "../ui/field";
import { makeItem } from "~/domain/nodeset/values/initial-value";
import { listTypesFor } from "./shapes";
import type { DraftDataValue, DraftDiagnostic, DraftItem } from "./value-draft";
import { useValueForm, type LeafProps } from "./value-form";

type Part<Key> = { key: Key; name: string; type: BuiltInType };

const DATA_VALUE_PARTS: readonly Part<Exclude<keyof DraftDataValue, "value">>[] = [
  { key: "statusCode", name: "StatusCode", type: "StatusCode" },
  { key: "sourceTimestamp", name: "SourceTimestamp", type: "DateTime" },
  { key: "sourcePicoseconds", name: "SourcePicoseconds", type: "UInt16" },
  { key: "serverTimestamp", name: "ServerTimestamp", type: "DateTime" },
  { key: "serverPicoseconds", name: "ServerPicoseconds", type: "UInt16" },
];

export function DataValueEditor({ label, item, onChange }: LeafProps) {
  const { TypedDraft } = useValueForm();
  const value = (item ?? {}) as DraftDataValue;
  const set = (key: keyof DraftDataValue, part: DraftItem | undefined): void =>
    onChange(withPart(value, key, part) as DraftDataValue);
  return (
    <fieldset className="structure-value" aria-label={label}>
      <PartRow
        name="Value"
        isPresent={value.value !== undefined}
        onSwitch={(on) => set("value", on ? { type: "Double", shape: "scalar", value: 0 } : undefined)}
      >
        {value.value ? (
          <TypedDraft
            label="Value"
            draft={value.value}
            onChange={(draft) => set("value", draft)}
            allowed={listTypesFor(undefined, undefined)}
            valueRank={-2}
          />
        ) : null}
      </PartRow>
      <Parts parts={DATA_VALUE_PARTS} value={value} onSet={set} />
    </fieldset>
  );
}

const DIAGNOSTIC_PARTS: readonly Part<Exclude<keyof DraftDiagnostic, "innerDiagnosticInfo">>[] = [
  { key: "symbolicId", name: "SymbolicId", type: "Int32" },
  { key: "namespaceUri", name: "NamespaceUri", type: "Int32" },
  { key: "locale", name: "Locale", type: "Int32" },
  { key: "localizedText", name: "LocalizedText", type: "Int32" },
  { key: "additionalInfo", name: "AdditionalInfo", type: "String" },
  { key: "innerStatusCode", name: "InnerStatusCode", type: "StatusCode" },
];

export function DiagnosticEditor({ label, item, onChange }: LeafProps) {
  const { readOnly } = useValueForm();
  if (item === null) {
    return (
      <Button size="small" disabled={readOnly} onClick={() => onChange({})}>
        New DiagnosticInfo
      </Button>
    );
  }
  const value = item as DraftDiagnostic;
  const set = (key: keyof DraftDiagnostic, part: DraftItem | undefined): void =>
    onChange(withPart(value, key, part) as DraftDiagnostic);
  return (
    <fieldset className="structure-value" aria-label={label}>
      <Parts parts={DIAGNOSTIC_PARTS} value={value} onSet={set} />
      <PartRow
        name="InnerDiagnosticInfo"
        isPresent={value.innerDiagnosticInfo !== undefined}
        onSwitch={(on) => set("innerDiagnosticInfo", on ? {} : undefined)}
      >
        {value.innerDiagnosticInfo ? (
          <DiagnosticEditor
            label="InnerDiagnosticInfo"
            item={value.innerDiagnosticInfo}
            onChange={(inner) => set("innerDiagnosticInfo", inner)}
          />
        ) : null}
      </PartRow>
    </fieldset>
  );
}

function withPart<T extends object>(value: T, key: keyof T, part: unknown): T {
  const { [key]: _old, ...rest } = value;
  return (part === undefined ? rest : { ...value, [key]: part }) as T;
}

function Parts<T extends object, Key extends keyof T & string>({
  parts,
  value,
  onSet,
}: {
  parts: readonly Part<Key>[];
  value: T;
  onSet: (key: Key, part: DraftItem | undefined) => void;
}) {
  const form = useValueForm();
  const { Item } = form;
  return (
    <>
      {parts.map(({ key, name, type }) => (
        <PartRow
          key={key}
          name={name}
          isPresent={value[key] !== undefined}
          onSwitch={(on) => onSet(key, on ? makeItem(form, type, undefined) : undefined)}
        >
          {value[key] === undefined ? null : (
            <Item type={type} label={name} item={value[key] as DraftItem} onChange={(item) => onSet(key, item)} />
          )}
        </PartRow>
      ))}
    </>
  );
}

function PartRow({
  name,
  isPresent,
  onSwitch,
  children,
}: {
  name: string;
  isPresent: boolean;
  onSwitch: (on: boolean) => void;
  children: ReactNode;
}) {
  const { readOnly } = useValueForm();
  return (
    <div className="field-row">
      <Checkbox
        className="min-h-6 items-center"
        aria-label={`${name} is present`}
        label={<span className="text-note text-ink-2">{name}</span>}
        checked={isPresent}
        disabled={readOnly}
        onChange={(event) => onSwitch(event.currentTarget.checked)}
      />
      <div className="min-w-0">
        {isPresent ? children : <span className="text-note leading-6 text-ink-3">left out</span>}
      </div>
      <span />
    </div>
  );
}
