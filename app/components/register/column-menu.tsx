import { Columns3 } from "lucide-react";
import { useState } from "react";
import { Button } from "../ui/button";
import { Checkbox, Field, Input, Select } from "../ui/field";
import { Popover } from "../ui/popover";
import { Segments } from "../ui/segments";
import type { ColumnId } from "./columns";
import type { SortRule } from "./row-order";
import type { ColumnChoice } from "./use-register-columns";

type Props = { choice: ColumnChoice; sort: SortRule | undefined; onSort: (sort: SortRule | undefined) => void };

/** Which columns are shown, how wide, in which order the rows, and in which languages the descriptions. */
export function ColumnMenu({ choice, sort, onSort }: Props) {
  const shown = choice.all.filter((column) => !choice.hidden.has(column.id));
  return (
    <Popover
      label="Columns and order"
      align="end"
      className="max-h-[70vh] w-84 overflow-y-auto p-3"
      trigger={
        <Button size="small" tone="bare" icon={Columns3}>
          Columns <span className="font-mono">{shown.length}</span> of <span className="font-mono">{choice.all.length}</span>
        </Button>
      }
    >
      <div className="grid gap-3">
        <div className="grid gap-2">
          <Field label="Sort by">
            {(tied) => (
              <Select
                {...tied}
                size="small"
                value={sort?.column ?? ""}
                onChange={(event) => {
                  const column = event.currentTarget.value as ColumnId | "";
                  onSort(column === "" ? undefined : { column, isDescending: sort?.isDescending ?? false });
                }}
              >
                <option value="">the order of the model</option>
                {choice.all.map((column) => (
                  <option key={column.id} value={column.id}>
                    {column.title}
                  </option>
                ))}
              </Select>
            )}
          </Field>
          <Segments
            label="Direction"
            value={sort?.isDescending ? "descending" : "ascending"}
            onChange={(direction) => sort && onSort({ ...sort, isDescending: direction === "descending" })}
            options={[
              { value: "ascending", label: "Ascending" },
              { value: "descending", label: "Descending" },
            ]}
            className="justify-self-start"
          />
        </div>
        <ul className="grid gap-1 border-t border-hair pt-2">
          {choice.all.map((column) => (
            <li key={column.id} className="grid grid-cols-[minmax(0,1fr)_76px] items-center gap-2">
              <Checkbox label={column.title} checked={!choice.hidden.has(column.id)} disabled={column.id === "name"} onChange={() => choice.toggle(column.id)} />
              <WidthField column={column} width={shown.find((other) => other.id === column.id)?.width ?? column.width} onWidth={(width) => choice.setWidth(column.id, width)} />
            </li>
          ))}
        </ul>
        <LanguageField onAdd={choice.addLanguage} />
        <Button size="small" className="justify-self-start" blockedBy={choice.isChanged ? undefined : "nothing was changed"} onClick={choice.reset}>
          As it came
        </Button>
      </div>
    </Popover>
  );
}

function WidthField({ column, width, onWidth }: { column: { title: string }; width: number; onWidth: (width: number) => void }) {
  return (
    <Input
      size="small"
      mono
      type="number"
      min={40}
      max={900}
      step={10}
      aria-label={`Width of ${column.title} in pixels`}
      defaultValue={width}
      key={width}
      onBlur={(event) => {
        const wanted = event.currentTarget.valueAsNumber;
        if (Number.isFinite(wanted) && wanted !== width) onWidth(wanted);
      }}
    />
  );
}

function LanguageField({ onAdd }: { onAdd: (language: string) => void }) {
  const [language, setLanguage] = useState("");
  const isLanguage = /^[A-Za-z]{2,8}(?:-[A-Za-z0-9]{1,8})*$/.test(language.trim());
  return (
    <form
      className="grid grid-cols-[minmax(0,1fr)_auto] items-end gap-2 border-t border-hair pt-2"
      onSubmit={(event) => {
        event.preventDefault();
        if (!isLanguage) return;
        onAdd(language.trim());
        setLanguage("");
      }}
    >
      <Field label="Descriptions in another language">
        {(tied) => <Input {...tied} size="small" mono placeholder="de" value={language} maxLength={40} onChange={(event) => setLanguage(event.currentTarget.value)} />}
      </Field>
      <Button type="submit" size="small" blockedBy={isLanguage ? undefined : "write a language tag, as de or pt-BR"}>
        Add column
      </Button>
    </form>
  );
}
