import { Plus, Replace } from "lucide-react";
import { useEffect, useRef, type ReactNode } from "react";
import { useFindingTally, useOpenModel } from "../model/use-model";
import { Button } from "../ui/button";
import { Input } from "../ui/field";
import { Segments, ToggleSegments } from "../ui/segments";

export type RegisterFilter = { readonly text: string; readonly withFindings: boolean; readonly showInherited: boolean };

type Props = {
  filter: RegisterFilter;
  onFilter: (filter: RegisterFilter) => void;
  rowCount: number;
  /** The menu of the columns. */
  columns: ReactNode;
  onAdd: () => void;
  onReplace: () => void;
  onLeave: () => void;
};

const SHOWN = new Set(["inherited"] as const);
const NOT_SHOWN = new Set<"inherited">();

/** Filter, columns and the way to new members, above the table. */
export function RegisterTools({ filter, onFilter, rowCount, columns, onAdd, onReplace, onLeave }: Props) {
  const { actions } = useOpenModel();
  const tally = useFindingTally();
  const field = useRef<HTMLInputElement>(null);
  const latestReplace = useRef(onReplace);
  latestReplace.current = onReplace;
  const findingCount = tally ? tally.error + tally.warning + tally.hint : 0;

  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent): void => {
      const target = event.target as Element | null;
      if (event.key.toLowerCase() === "h" && (event.ctrlKey || event.metaKey) && !event.shiftKey && !event.altKey) {
        event.preventDefault();
        latestReplace.current();
        return;
      }
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
        title="Words anywhere in a row, or in one column: “unit: mm”. “Unit:” alone asks for what is not filled in."
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
      {actions.canEdit ? (
        <Button size="small" tone="bare" icon={Replace} title="Ctrl H" onClick={onReplace}>
          Replace
        </Button>
      ) : null}
      {columns}
      {actions.canEdit ? (
        <Button size="small" icon={Plus} onClick={onAdd}>
          Member
        </Button>
      ) : null}
    </div>
  );
}
