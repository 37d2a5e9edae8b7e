/** Controls for types of several texts: LocalizedText, QualifiedName, ByteString, XmlElement, StatusCode. */
import { useId, useMemo, useState } from "react";
import { OPC_UA_NAMESPACE } from "~/domain/address-space/node-id";
import type { XmlText } from "~/domain/address-space/node";
import type { LocalizedText, QualifiedName } from "~/domain/address-space/qualified-name";
import { formatProblem } from "~/domain/core/problem-texts";
import { isWritableText } from "~/domain/nodeset/values/scalar-text";
import { findStatusCode, findStatusName, STATUS_NAMES } from "~/domain/nodeset/values/status-codes";
import { readFragment } from "~/domain/nodeset/values/xml-fragment";
import { getNamespaceLabel } from "../model/namespace-label";
import { rankText } from "../palette/rank-entries";
import { Combobox } from "../ui/combobox";
import { Input, Select, TextArea } from "../ui/field";
import { Segments } from "../ui/segments";
import { NullButton, Reason, useTypedText } from "./leaf-controls";
import { formatBytes, parseBytes, toBytes, type ByteNotation } from "./leaf-text";
import { isUnfinished, unfinished, type DraftItem } from "./value-draft";
import { useValueForm, type LeafProps } from "./value-form";

export function LocalizedTextLeaf({ label, id, item, onChange, autoFocus }: LeafProps) {
  const { readOnly } = useValueForm();
  const value = item as LocalizedText | null;
  const withText = (text: string): LocalizedText => ({
    ...(value?.locale === undefined ? {} : { locale: value.locale }),
    text,
  });
  return (
    <div className="grid grid-cols-[minmax(0,1fr)_52px_auto] items-start gap-1">
      <Input
        {...(id === undefined ? { "aria-label": label } : { id })}
        size="small"
        value={value?.text ?? ""}
        placeholder={value === null ? "null" : undefined}
        readOnly={readOnly}
        autoFocus={autoFocus ?? false}
        autoComplete="off"
        onChange={(event) => {
          if (isWritableText(event.currentTarget.value)) onChange(withText(event.currentTarget.value));
        }}
      />
      <Input
        aria-label={`Locale of ${label}`}
        size="small"
        mono
        value={value?.locale ?? ""}
        placeholder="en"
        maxLength={35}
        readOnly={readOnly}
        autoComplete="off"
        onChange={(event) => {
          const locale = event.currentTarget.value.trim();
          const text = value?.text ?? "";
          onChange(locale === "" ? { text } : { locale, text });
        }}
      />
      <NullButton label={label} item={item} onChange={onChange} empty={{ text: "" }} />
    </div>
  );
}

export function QualifiedNameLeaf({ label, id, item, onChange, autoFocus }: LeafProps) {
  const { space, readOnly } = useValueForm();
  const value = item as QualifiedName | null;
  const uris = useMemo(() => {
    const known = space.layers.flatMap((layer) => [
      ...layer.header.models.map((m) => m.modelUri),
      ...layer.header.namespaceUris,
    ]);
    return [...new Set([OPC_UA_NAMESPACE, ...known, ...(value ? [value.namespaceUri] : [])])];
  }, [space, value]);
  const namespaceUri = value?.namespaceUri ?? OPC_UA_NAMESPACE;
  return (
    <div className="grid grid-cols-[minmax(0,1fr)_104px_auto] items-start gap-1">
      <Input
        {...(id === undefined ? { "aria-label": label } : { id })}
        size="small"
        mono
        value={value?.name ?? ""}
        placeholder={value === null ? "null" : undefined}
        maxLength={512}
        readOnly={readOnly}
        autoFocus={autoFocus ?? false}
        autoComplete="off"
        onChange={(event) => {
          if (isWritableText(event.currentTarget.value)) onChange({ namespaceUri, name: event.currentTarget.value });
        }}
      />
      <Select
        aria-label={`Namespace of ${label}`}
        size="small"
        value={namespaceUri}
        disabled={readOnly}
        title={namespaceUri}
        onChange={(event) => onChange({ namespaceUri: event.currentTarget.value, name: value?.name ?? "" })}
      >
        {uris.map((uri) => (
          <option key={uri} value={uri}>
            {getNamespaceLabel(uri)}
          </option>
        ))}
      </Select>
      <NullButton label={label} item={item} onChange={onChange} empty={{ namespaceUri: OPC_UA_NAMESPACE, name: "" }} />
    </div>
  );
}

export function BytesLeaf({ label, id, item, onChange, autoFocus }: LeafProps) {
  const { readOnly } = useValueForm();
  const reasonId = useId();
  const [notation, setNotation] = useState<ByteNotation>("hex");
  const [text, setText] = useTypedText(item, (now) =>
    isUnfinished(now) ? now.unfinished : formatBytes((now as string | null) ?? "", notation),
  );
  const count = typeof item === "string" ? toBytes(item).length : 0;

  function take(typed: string): void {
    const next = parseBytes(typed, notation);
    setText(typed, next);
    onChange(next);
  }
  function change(next: ByteNotation): void {
    if (isUnfinished(item)) return;
    setNotation(next);
    setText(formatBytes((item as string | null) ?? "", next), item);
  }
  return (
    <div className="min-w-0">
      <TextArea
        {...(id === undefined ? { "aria-label": label } : { id })}
        {...(isUnfinished(item) ? { "aria-invalid": true, "aria-describedby": reasonId } : {})}
        mono
        rows={Math.min(6, 1 + Math.floor(text.length / 48))}
        value={text}
        placeholder={item === null ? "null" : notation === "hex" ? "0A FF" : "Cv8="}
        readOnly={readOnly}
        autoFocus={autoFocus ?? false}
        spellCheck={false}
        onChange={(event) => take(event.currentTarget.value)}
      />
      <div className="mt-1 flex items-center gap-2">
        <Segments
          label={`Notation of ${label}`}
          className="h-5.5!"
          value={notation}
          onChange={change}
          options={[
            { value: "hex", label: "Hex" },
            { value: "base64", label: "Base64" },
          ]}
        />
        <span className="font-mono text-note text-ink-3">
          {count} {count === 1 ? "byte" : "bytes"}
        </span>
        <NullButton label={label} item={item} onChange={onChange} empty="" />
      </div>
      <Reason id={reasonId} item={item} />
    </div>
  );
}

/** XML as text; what stands in it must be whole elements. */
export function XmlLeaf({
  label,
  id,
  item,
  onChange,
  autoFocus,
  isNullable = true,
}: LeafProps & { isNullable?: boolean }) {
  const { readOnly } = useValueForm();
  const reasonId = useId();
  const [text, setText] = useTypedText(item, (now) =>
    isUnfinished(now) ? now.unfinished : ((now as XmlText | null)?.xml ?? ""),
  );
  const kept = !isUnfinished(item) && item !== null ? (item as XmlText) : undefined;
  const [context] = useState(kept);

  function take(typed: string): void {
    const next = typed.trim() === "" && isNullable ? null : parseXml(typed, context);
    setText(typed, next);
    onChange(next);
  }
  return (
    <div className="min-w-0">
      <TextArea
        {...(id === undefined ? { "aria-label": label } : { id })}
        {...(isUnfinished(item) ? { "aria-invalid": true, "aria-describedby": reasonId } : {})}
        mono
        rows={Math.min(14, Math.max(3, text.split("\n").length))}
        value={text}
        placeholder={item === null ? "null, or an element: <Note xmlns=…>…</Note>" : undefined}
        readOnly={readOnly}
        autoFocus={autoFocus ?? false}
        spellCheck={false}
        onChange={(event) => take(event.currentTarget.value)}
      />
      <Reason id={reasonId} item={item} />
    </div>
  );
}

/** Prefixes that stood outside go on to hold. */
function parseXml(xml: string, context: XmlText | undefined): DraftItem {
  const value: XmlText = { ...context, xml };
  const read = readFragment(value);
  if (!read.ok) return unfinished(xml, `This is not well-formed: ${read.problems.map(formatProblem).join(" ")}`);
  if (read.value.length === 0) return unfinished(xml, "An XmlElement holds an element, not text alone.");
  return value;
}

const MOST_STATUS = 40;

export function StatusLeaf({ label, id, item, onChange, autoFocus }: LeafProps) {
  const { readOnly } = useValueForm();
  const reasonId = useId();
  const [query, setQuery] = useState<string>();
  const shown = isUnfinished(item) ? item.unfinished : describeStatus(typeof item === "number" ? item : 0);
  const hits = useMemo(() => {
    const ranked = STATUS_NAMES.map((status) => ({ status, score: rankText(status.name, query ?? "") })).filter(
      (hit) => hit.score > 0,
    );
    return ranked
      .sort((a, b) => b.score - a.score || a.status.name.length - b.status.name.length)
      .slice(0, MOST_STATUS);
  }, [query]);

  function take(text: string): void {
    setQuery(undefined);
    const code = findStatusCode(text);
    onChange(
      code ??
        unfinished(
          text,
          "No status code is called so. Write a name such as BadNotConnected, or its number 0x808A0000.",
        ),
    );
  }
  if (readOnly) return <Input size="small" mono readOnly aria-label={label} value={shown} />;
  return (
    <div className="min-w-0">
      <Combobox
        label={label}
        {...(id === undefined ? {} : { id })}
        {...(isUnfinished(item) ? { "aria-invalid": true, "aria-describedby": reasonId } : {})}
        size="small"
        mono
        autoFocus={autoFocus ?? false}
        query={query ?? shown}
        onQuery={setQuery}
        items={hits}
        itemKey={({ status }) => status.name}
        renderItem={({ status }) => (
          <span className="flex justify-between gap-3 font-mono">
            {status.name} <span className="text-ink-3">{formatCode(status.code)}</span>
          </span>
        )}
        onPick={({ status }) => take(status.name)}
        onCancel={() => {
          if (query !== undefined && query !== shown) take(query);
        }}
        none="Enter takes a number such as 0x808A0000"
      />
      <Reason id={reasonId} item={item} />
    </div>
  );
}

export function describeStatus(code: number): string {
  const name = findStatusName(code);
  return name !== undefined && (code & 0xffff) === 0 ? name : formatCode(code);
}

function formatCode(code: number): string {
  return `0x${code.toString(16).toUpperCase().padStart(8, "0")}`;
}
