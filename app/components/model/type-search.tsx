import { useMemo, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import { Combobox } from "../ui/combobox";
import { cx } from "../ui/cx";
import { Input } from "../ui/field";
import { findTypes, type TypeHit, type TypeKind } from "./find-types";
import { getNodeName } from "./member-facts";
import "./model.css";

type SearchProps = {
  label: string;
  id?: string;
  space: AddressSpace;
  kind: TypeKind;
  initial?: string;
  /** Only types from which instances may be made. */
  concreteOnly?: boolean;
  below?: NodeKey;
  placeholder?: string;
  autoFocus?: boolean;
  onPick: (type: NodeKey) => void;
  onCancel?: () => void;
};

const MOST = 30;

/** Searches a type over all loaded models, with the description that its model gives. */
export function TypeSearch(props: SearchProps) {
  const { label, id, space, kind, initial = "", concreteOnly, below, placeholder, autoFocus = true, onPick, onCancel } = props;
  const [query, setQuery] = useState(initial);
  const hits = useMemo(
    () => findTypes(space, { kind, ...(concreteOnly ? { concreteOnly } : {}), ...(below === undefined ? {} : { below }) }, query, MOST),
    [space, kind, concreteOnly, below, query],
  );
  return (
    <Combobox<TypeHit>
      label={label}
      {...(id === undefined ? {} : { id })}
      size="small"
      autoFocus={autoFocus}
      query={query}
      onQuery={setQuery}
      items={hits}
      itemKey={(hit) => hit.key}
      renderItem={(hit) => <TypeHitRow hit={hit} />}
      onPick={(hit) => onPick(hit.key)}
      {...(onCancel ? { onCancel } : {})}
      placeholder={placeholder ?? `Search ${kind}`}
      none="No type of this name in the loaded models"
      panelClassName="w-115!"
    />
  );
}

export function TypeHitRow({ hit }: { hit: TypeHit }) {
  return (
    <span className="type-hit">
      <NodeClassGlyph kind={hit.kind} />
      <em>{hit.name}</em>
      <code>
        {hit.isAbstract ? "abstract " : ""}
        {hit.namespaceLabel}
      </code>
      {hit.description === "" ? null : <p>{hit.description}</p>}
    </span>
  );
}

type FieldProps = {
  id?: string;
  label: string;
  space: AddressSpace;
  kind: TypeKind;
  value: NodeKey | undefined;
  readOnly?: boolean;
  concreteOnly?: boolean;
  below?: NodeKey;
  onPick: (type: NodeKey) => void;
};

/** Looks like any other field although the text itself is not typed into. */
export const EDITABLE = "cursor-pointer border-edge! bg-leaf! hover:border-ink!";

/** Shows the chosen type; pressed or typed into, it becomes the search. */
export function TypeField({ id, label, space, kind, value, readOnly = false, concreteOnly, below, onPick }: FieldProps) {
  const [search, setSearch] = useState<string>();
  if (search === undefined || readOnly) {
    return (
      <Input
        {...(id === undefined ? { "aria-label": label } : { id })}
        size="small"
        readOnly
        className={cx(kind === "DataType" ? "font-mono" : "italic", !readOnly && EDITABLE)}
        value={getNodeName(space, value)}
        onClick={() => setSearch("")}
        onKeyDown={(event) => {
          if (event.key === "Enter" || event.key === "F2" || event.key === "ArrowDown") setSearch("");
          else if (event.key.length === 1 && !event.ctrlKey && !event.metaKey) setSearch(event.key);
          else return;
          event.preventDefault();
        }}
      />
    );
  }
  return (
    <TypeSearch
      label={label}
      {...(id === undefined ? {} : { id })}
      space={space}
      kind={kind}
      initial={search}
      placeholder={getNodeName(space, value)}
      {...(concreteOnly ? { concreteOnly } : {})}
      {...(below === undefined ? {} : { below })}
      onPick={(type) => {
        setSearch(undefined);
        onPick(type);
      }}
      onCancel={() => setSearch(undefined)}
    />
  );
}
