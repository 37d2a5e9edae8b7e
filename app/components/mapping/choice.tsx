import { Field, Select } from "~/components/ui/field";

type ChoiceProps<Value extends string> = {
  label: string;
  value: Value;
  options: readonly (readonly [value: Value, label: string])[];
  onChange: (value: Value) => void;
};

export function Choice<Value extends string>({ label, value, options, onChange }: ChoiceProps<Value>) {
  return (
    <Field label={label}>
      {(tied) => (
        <Select {...tied} size="small" value={value} onChange={(event) => onChange(event.currentTarget.value as Value)}>
          {options.map(([option, word]) => (
            <option key={option} value={option}>
              {word}
            </option>
          ))}
        </Select>
      )}
    </Field>
  );
}
