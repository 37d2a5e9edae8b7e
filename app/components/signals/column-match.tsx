import { useState } from "react";
import { Button } from "~/components/ui/button";
import { Field, Input, Select } from "~/components/ui/field";
import { signalFields, type ColumnChoice, type SignalField } from "~/domain/editing/starters/read-signal-list";
import { applyTemplate, dropTemplate, keepTemplate, type ColumnTemplate } from "./column-templates";

const words: Record<SignalField, string> = {
  name: "Name",
  group: "Group",
  dataType: "Data type",
  unit: "Unit",
  low: "Range from",
  high: "Range to",
  description: "Description",
  rule: "Optional or not",
  access: "Access",
};

type Props = {
  head: readonly string[];
  columns: ColumnChoice;
  templates: readonly ColumnTemplate[];
  onChange: (columns: ColumnChoice) => void;
  onTemplates: (templates: readonly ColumnTemplate[]) => void;
};

/** Which column holds what: guessed from the heads or taken from a template, corrected here. */
export function ColumnMatch({ head, columns, templates, onChange, onTemplates }: Props) {
  function choose(field: SignalField, value: string): void {
    const { [field]: _old, ...others } = columns;
    onChange(value === "" ? others : { ...others, [field]: Number(value) });
  }
  return (
    <section aria-label="Columns">
      <h2 className="mb-1.5 text-lead font-semibold">Columns</h2>
      <div className="grid grid-cols-[repeat(auto-fill,minmax(130px,1fr))] gap-3">
        {signalFields.map((field) => (
          <Field key={field} label={words[field]}>
            {(tied) => (
              <Select
                {...tied}
                size="small"
                value={columns[field] ?? ""}
                onChange={(event) => choose(field, event.currentTarget.value)}
              >
                <option value="">none</option>
                {head.map((text, i) => (
                  <option key={`${text} ${i}`} value={i}>
                    {text || `column ${i + 1}`}
                  </option>
                ))}
              </Select>
            )}
          </Field>
        ))}
      </div>
      <TemplateBar head={head} columns={columns} templates={templates} onChange={onChange} onTemplates={onTemplates} />
    </section>
  );
}

function TemplateBar({ head, columns, templates, onChange, onTemplates }: Props) {
  const [name, setName] = useState("");
  const [chosen, setChosen] = useState("");
  const template = templates.find((one) => one.name === chosen);
  const fitting = template && applyTemplate(template, head);
  return (
    <div className="mt-3 flex flex-wrap items-end gap-x-6 gap-y-2 border-t border-hair pt-2">
      {templates.length > 0 ? (
        <div className="flex items-end gap-2">
          <Field label="Template">
            {(tied) => (
              <Select {...tied} size="small" className="w-44" value={chosen} onChange={(event) => setChosen(event.currentTarget.value)}>
                <option value="">choose one</option>
                {templates.map((one) => (
                  <option key={one.name} value={one.name}>
                    {one.name}
                  </option>
                ))}
              </Select>
            )}
          </Field>
          <Button
            size="small"
            blockedBy={!template ? "choose a template" : fitting ? undefined : "this list lacks one of its columns"}
            onClick={() => fitting && onChange(fitting)}
          >
            Use it
          </Button>
          <Button size="small" tone="bare" blockedBy={template ? undefined : "choose a template"} onClick={() => onTemplates(dropTemplate(chosen))}>
            Forget it
          </Button>
        </div>
      ) : null}
      <form
        className="flex items-end gap-2"
        onSubmit={(event) => {
          event.preventDefault();
          if (name.trim() === "") return;
          onTemplates(keepTemplate(name.trim(), head, columns));
          setChosen(name.trim());
          setName("");
        }}
      >
        <Field label="Keep these columns as template">
          {(tied) => <Input {...tied} size="small" className="w-44!" maxLength={60} placeholder="Controller export" value={name} onChange={(event) => setName(event.currentTarget.value)} />}
        </Field>
        <Button type="submit" size="small" blockedBy={name.trim() === "" ? "give it a name" : undefined}>
          Keep
        </Button>
      </form>
    </div>
  );
}
