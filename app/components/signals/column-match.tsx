import { Field, Select } from "~/components/ui/field";
import { signalFields, type ColumnChoice, type SignalField } from "~/domain/editing/starters/read-signal-list";

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

/** Which column holds what: guessed from the heads, corrected here. */
export function ColumnMatch({
  head,
  columns,
  onChange,
}: {
  head: readonly string[];
  columns: ColumnChoice;
  onChange: (columns: ColumnChoice) => void;
}) {
  function choose(field: SignalField, value: string): void {
    const { [field]: _old, ...others } = columns;
    onChange(value === "" ? others : { ...others, [field]: Number(value) });
  }
  return (
    <section>
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
    </section>
  );
}
