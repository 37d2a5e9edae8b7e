import { useMemo, type FormEvent, type ReactNode } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { Button } from "../ui/button";
import { Field, Input, Select } from "../ui/field";
import { Segments } from "../ui/segments";
import { listParents } from "./list-parents";
import type { RuleName } from "./member-facts";

/** The frame of each form: fields, then the one action. */
export function AddForm({ onSubmit, label = "Add", children }: { onSubmit: () => void; label?: string; children: ReactNode }) {
  return (
    <form
      className="add-form"
      autoComplete="off"
      onSubmit={(event: FormEvent) => {
        event.preventDefault();
        onSubmit();
      }}
    >
      <div className="add-fields">{children}</div>
      <footer>
        <span className="text-note text-ink-3">Enter adds, Esc closes</span>
        <Button type="submit" tone="main">
          {label}
        </Button>
      </footer>
    </form>
  );
}

export function NameField({ value, onChange, error }: { value: string; onChange: (name: string) => void; error?: string | undefined }) {
  return (
    <Field label="Name" errors={error === undefined ? undefined : [error]}>
      {(control) => <Input {...control} data-first size="small" autoFocus spellCheck={false} value={value} onChange={(event) => onChange(event.currentTarget.value)} />}
    </Field>
  );
}

type ParentProps = { space: AddressSpace; value: NodeKey | undefined; onChange: (parent: NodeKey) => void };

/** The node to which the new member belongs. */
export function ParentField({ space, value, onChange }: ParentProps) {
  const parents = useMemo(() => listParents(space), [space]);
  return (
    <Field label="Belongs to">
      {(control) => (
        <Select {...control} size="small" value={value ?? ""} onChange={(event) => onChange(event.currentTarget.value as NodeKey)}>
          {value === undefined ? <option value="">choose …</option> : null}
          {parents.map((parent) => (
            <option key={parent.key} value={parent.key}>
              {parent.label}
            </option>
          ))}
        </Select>
      )}
    </Field>
  );
}

const RULES: readonly { value: RuleName; label: string }[] = [
  { value: "Mandatory", label: "Mandatory" },
  { value: "Optional", label: "Optional" },
  { value: "OptionalPlaceholder", label: "0..n" },
  { value: "MandatoryPlaceholder", label: "1..n" },
];

/** Modelling rule of a member of a type. */
export function RuleField({ value, onChange }: { value: RuleName; onChange: (rule: RuleName) => void }) {
  return (
    <div className="grid gap-1">
      <span className="text-note font-medium text-ink-2">Rule</span>
      <Segments label="Modelling rule" value={value} onChange={onChange} options={RULES} />
    </div>
  );
}

export function DescriptionField({ value, onChange }: { value: string; onChange: (text: string) => void }) {
  return (
    <Field label="Description" optional>
      {(control) => <Input {...control} size="small" value={value} onChange={(event) => onChange(event.currentTarget.value)} />}
    </Field>
  );
}
