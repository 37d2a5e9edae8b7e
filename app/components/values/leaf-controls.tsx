/** Controls for the types that are one text, one choice or one tick. Each says inline why its text is no value. */
import { useEffect, useId, useRef, useState } from "react";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { BuiltInType, Scalar } from "~/domain/nodeset/values/variant";
import { Button } from "../ui/button";
import { cx } from "../ui/cx";
import { Checkbox, Input, Select, TextArea } from "../ui/field";
import { formatLeaf, parseLeaf } from "./leaf-text";
import { isUnfinished, type DraftItem } from "./value-draft";
import { useValueForm, type LeafProps } from "./value-form";

/** A reason below its control, tied to it. */
export function Reason({ id, item }: { id: string; item: DraftItem }) {
  return isUnfinished(item) ? (
    <p id={id} role="alert" className="mt-0.5 text-note text-error">
      {item.reason}
    </p>
  ) : null;
}

/**
 * The text of a leaf while it is typed: it follows the value only when somebody else changed that, so that `1.` is not
 * made `1` under the caret.
 */
export function useTypedText(
  item: DraftItem,
  format: (item: DraftItem) => string,
): [string, (text: string, next: DraftItem) => void] {
  const [text, setText] = useState(() => format(item));
  const own = useRef(item);
  useEffect(() => {
    if (Object.is(own.current, item)) return;
    own.current = item;
    setText(format(item));
  });
  return [
    text,
    (typed, next) => {
      own.current = next;
      setText(typed);
    },
  ];
}

const formatItem = (item: DraftItem): string => (isUnfinished(item) ? item.unfinished : formatLeaf(item as Scalar));

/** The figures that stand for nothing: what the type starts from. */
const NUMERIC: ReadonlySet<BuiltInType> = new Set<BuiltInType>([
  "SByte",
  "Byte",
  "Int16",
  "UInt16",
  "Int32",
  "UInt32",
  "Int64",
  "UInt64",
  "Float",
  "Double",
]);

export function TextLeaf({ type, label, id, item, onChange, autoFocus }: LeafProps & { type: BuiltInType }) {
  const { readOnly } = useValueForm();
  const reasonId = useId();
  const [text, setText] = useTypedText(item, formatItem);
  const isNullable = type === "String";
  const isLong = type === "String" && text.includes("\n");

  function take(typed: string): void {
    const next = parseLeaf(type, typed);
    setText(typed, next);
    onChange(next);
  }

  const shared = {
    ...(id === undefined ? { "aria-label": label } : { id }),
    ...(isUnfinished(item) ? { "aria-invalid": true as const, "aria-describedby": reasonId } : {}),
    value: text,
    readOnly,
    autoFocus: autoFocus ?? false,
    spellCheck: false,
    autoComplete: "off",
    placeholder: item === null ? "null" : type === "DateTime" ? "2026-12-01T09:30:00Z" : undefined,
  };
  return (
    <div className="min-w-0">
      <div className="flex items-start gap-1">
        {isLong ? (
          <TextArea
            {...shared}
            rows={Math.min(8, text.split("\n").length + 1)}
            onChange={(event) => take(event.currentTarget.value)}
          />
        ) : (
          <Input
            {...shared}
            size="small"
            mono={type !== "String"}
            className={cx(NUMERIC.has(type) && "text-right")}
            onChange={(event) => take(event.currentTarget.value)}
            onKeyDown={(event) => {
              if (type !== "String" || event.key !== "Enter" || !event.shiftKey) return;
              event.preventDefault();
              take(`${text}\n`);
            }}
          />
        )}
        {type === "DateTime" && !readOnly ? (
          <Button
            size="small"
            onClick={() => take(`${new Date().toISOString().slice(0, 19)}Z`)}
            aria-label={`Now for ${label}`}
          >
            Now
          </Button>
        ) : null}
        {type === "Guid" && !readOnly ? (
          <Button size="small" onClick={() => take(crypto.randomUUID())} aria-label={`New Guid for ${label}`}>
            New
          </Button>
        ) : null}
        {isNullable ? <NullButton label={label} item={item} onChange={onChange} empty="" /> : null}
      </div>
      <Reason id={reasonId} item={item} />
    </div>
  );
}

/** Null is another value than an empty text (OPC 10000-6 §5.1.2); pressed means null. */
export function NullButton({
  label,
  item,
  onChange,
  empty,
}: {
  label: string;
  item: DraftItem;
  onChange: (item: DraftItem) => void;
  empty: DraftItem;
}) {
  const { readOnly } = useValueForm();
  const isNull = item === null;
  if (readOnly) return isNull ? <span className="self-center font-mono text-note text-ink-3">null</span> : null;
  return (
    <button
      type="button"
      aria-pressed={isNull}
      aria-label={`${label} is null`}
      title={isNull ? "null: no value at all. Press for an empty one." : "Make it null: no value at all"}
      className={cx(
        "h-6 shrink-0 rounded-edge border px-1 font-mono text-note",
        isNull ? "border-ink bg-ink text-ink-on" : "border-transparent text-ink-3 hover:border-edge hover:text-ink",
      )}
      onClick={() => onChange(isNull ? empty : null)}
    >
      null
    </button>
  );
}

export function BooleanLeaf({ label, id, item, onChange, autoFocus }: LeafProps) {
  const { readOnly } = useValueForm();
  return (
    <Checkbox
      {...(id === undefined ? { "aria-label": label } : { id })}
      label={<span className="font-mono text-ink-2">{item === true ? "true" : "false"}</span>}
      className="min-h-6 items-center"
      checked={item === true}
      disabled={readOnly}
      autoFocus={autoFocus ?? false}
      onChange={(event) => onChange(event.currentTarget.checked)}
    />
  );
}

/** The texts of an enumeration with their numbers; a number without a text stays and says so. */
export function EnumerationLeaf({ label, id, item, onChange, autoFocus, dataType }: LeafProps & { dataType: NodeKey }) {
  const { types, readOnly } = useValueForm();
  const names = types.findEnumerationNames(dataType) ?? new Map<number, string>();
  const value = typeof item === "number" ? item : 0;
  return (
    <Select
      {...(id === undefined ? { "aria-label": label } : { id })}
      size="small"
      value={String(value)}
      disabled={readOnly}
      autoFocus={autoFocus ?? false}
      onChange={(event) => onChange(Number(event.currentTarget.value))}
    >
      {names.has(value) ? null : <option value={String(value)}>{value}, which is none of its values</option>}
      {[...names].map(([number, name]) => (
        <option key={number} value={number}>
          {name} ({number})
        </option>
      ))}
    </Select>
  );
}
