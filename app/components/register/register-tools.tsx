import { Columns3, Plus } from "lucide-react";
import { useEffect, useRef } from "react";
import { useFindingTally, useOpenModel } from "../model/use-model";
import { Button } from "../ui/button";
import { Input } from "../ui/field";
import { Menu } from "../ui/menu";
import { Segments, ToggleSegments } from "../ui/segments";
import { COLUMNS } from "./columns";
import type { ColumnChoice } from "./use-register-columns";

export type RegisterFilter = { readonly text: string; readonly withFindings: boolean; readonly showInherited: boolean };

type Props = {
  filter: RegisterFilter;
  onFilter: (filter: RegisterFilter) => void;
  rowCount: number;
  columns: ColumnChoice;
  onAdd: () => void;
  onLeave: () => void;
};

const SHOWN = new Set(["inherited"] as const);
const NOT_SHOWN = new Set<"inherited">();

/** Filter, columns and the way to new members, above the table. */
export function RegisterTools({ filter, onFilter, rowCount, columns, onAdd, onLeave }: Props) {
  const { actions } = useOpenModel();
  const tally = useFindingTally();
  const field = useRef<HTMLInputElement>(null);
  const findingCount = tally ? tally.error + tally.warning + tally.hint : 0;

  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent): void => {
      const target = event.target as Element | null;
      if (event.key !== "/" || event.ctrlKey || event.metaKey || target?.closest("input, textarea, select, [contenteditable]")) return;
      event.preventDefault();
      field.current?.focus();
    };
    window.addEventListener("keydown", onKeyDown);
    return () => window.removeEventListener("keydown", onKeyDown);
  }, []);

  return (
    <div className="register-tools" role="toolbar" aria-label="Register tools">
      <Input
        ref={field}
        type="search"
        className="w-58!"
        aria-label="Filter members"
        placeholder="Filter members  /"
        value={filter.text}
        onChange={(event) => onFilter({ ...filter, text: event.currentTarget.value })}
        onKeyDown={(event) => {
          if (event.key === "Escape") onFilter({ ...filter, text: "" });
          if (event.key === "Escape" || event.key === "Enter" || event.key === "ArrowDown") {
            event.preventDefault();
            onLeave();
          }
        }}
      />
      <Segments
        label="Rows"
        value={filter.withFindings ? "findings" : "all"}
        onChange={(value) => onFilter({ ...filter, withFindings: value === "findings" })}
        options={[
          { value: "all", label: "All" },
          {
            value: "findings",
            label: (
              <>
                With findings <span className="font-mono">{findingCount}</span>
              </>
            ),
          },
        ]}
      />
      <ToggleSegments
        label="Also shown"
        options={[{ value: "inherited", label: "Inherited" }]}
        values={filter.showInherited ? SHOWN : NOT_SHOWN}
        onToggle={() => onFilter({ ...filter, showInherited: !filter.showInherited })}
      />
      <span className="ml-auto text-note text-ink-3" aria-live="polite">
        <span className="font-mono">{rowCount}</span> rows
      </span>
      <Menu
        label="Columns"
        align="end"
        trigger={
          <Button size="small" tone="bare" icon={Columns3}>
            Columns <span className="font-mono">{COLUMNS.length - columns.hidden.size}</span> of <span className="font-mono">{COLUMNS.length}</span>
          </Button>
        }
        entries={COLUMNS.filter((column) => column.id !== "name").map((column) => ({
          kind: "choice" as const,
          label: column.title,
          checked: !columns.hidden.has(column.id),
          onSelect: () => columns.toggle(column.id),
        }))}
      />
      {actions.canEdit ? (
        <Button size="small" icon={Plus} onClick={onAdd}>
          Member
        </Button>
      ) : null}
    </div>
  );
}
