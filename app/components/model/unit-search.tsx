import { useMemo, useState } from "react";
import { Combobox } from "../ui/combobox";
import { Input } from "../ui/field";
import { Kbd } from "../ui/tag";
import { EDITABLE } from "./type-search";
import type { UnitFacts } from "./analog-facts";
import { countUnits, searchUnits, UNIT_TABLE, useUnitTable, type UnitHit } from "./unit-lookup";
import "./model.css";

type SearchProps = {
  label: string;
  id?: string;
  initial: string;
  /** Undefined takes the unit away. */
  onPick: (unit: UnitFacts | undefined) => void;
  onCancel?: () => void;
};

const MOST = 40;
const NONE = "none";

/** Searches a unit by symbol, name or UNECE code; hangs on the cell and names its table. */
export function UnitSearch({ label, id, initial, onPick, onCancel }: SearchProps) {
  const isThere = useUnitTable();
  const [query, setQuery] = useState(initial);
  const hits = useMemo<readonly (UnitHit | typeof NONE)[]>(() => (query.trim() === "" ? [NONE, ...searchUnits("", MOST)] : searchUnits(query, MOST)), [query, isThere]);
  return (
    <Combobox<UnitHit | typeof NONE>
      label={label}
      {...(id === undefined ? {} : { id })}
      size="small"
      autoFocus
      query={query}
      onQuery={setQuery}
      items={hits}
      itemKey={(hit) => (hit === NONE ? NONE : hit.code)}
      renderItem={(hit) => (hit === NONE ? <span className="text-ink-3">no unit</span> : <UnitHitRow hit={hit} />)}
      onPick={(hit) => onPick(hit === NONE ? undefined : hit)}
      {...(onCancel ? { onCancel } : {})}
      placeholder="°C, degree, CEL"
      none="No unit of this name in the table"
      panelClassName="w-130!"
      head={
        <>
          <span className="font-mono">
            {hits.filter((hit) => hit !== NONE).length} of {countUnits()}
          </span>
          <span>{UNIT_TABLE}</span>
        </>
      }
      foot={
        <span className="ml-auto flex gap-1.5">
          <Kbd>Enter</Kbd>
          <Kbd>Esc</Kbd>
        </span>
      }
    />
  );
}

function UnitHitRow({ hit }: { hit: UnitHit }) {
  return (
    <span className="unit-hit">
      <b>{hit.symbol}</b>
      <span>{hit.name}</span>
      <code>{hit.code}</code>
      <code>{hit.unitId}</code>
      <i>{hit.quantity}</i>
    </span>
  );
}

type FieldProps = { id?: string; label: string; value: UnitFacts | undefined; readOnly?: boolean; onPick: (unit: UnitFacts | undefined) => void };

/** Shows symbol, name and id of the unit; pressed or typed into, it becomes the search. */
export function UnitField({ id, label, value, readOnly = false, onPick }: FieldProps) {
  const [search, setSearch] = useState<string>();
  if (search !== undefined && !readOnly) {
    return (
      <UnitSearch
        label={label}
        {...(id === undefined ? {} : { id })}
        initial={search}
        onPick={(unit) => {
          setSearch(undefined);
          onPick(unit);
        }}
        onCancel={() => setSearch(undefined)}
      />
    );
  }
  return (
    <span className="unit-field">
      <Input
        {...(id === undefined ? { "aria-label": label } : { id })}
        size="small"
        readOnly
        className={readOnly ? "" : EDITABLE}
        placeholder="none"
        value={value ? `${value.symbol}   ${value.name === value.symbol ? "" : value.name}` : ""}
        onClick={() => setSearch("")}
        onKeyDown={(event) => {
          if (event.key === "Enter" || event.key === "F2" || event.key === "ArrowDown") setSearch("");
          else if (event.key === "Delete" && !readOnly) onPick(undefined);
          else if (event.key.length === 1 && !event.ctrlKey && !event.metaKey) setSearch(event.key);
          else return;
          event.preventDefault();
        }}
      />
      {value ? <code>{value.unitId}</code> : null}
    </span>
  );
}
