import { useState } from "react";
import { Field, TextArea } from "../ui/field";
import { AddForm, DescriptionField, NameField } from "./add-form-parts";
import type { AddFormProps } from "./add-request";
import { parseEnumeration } from "./parse-enumeration";
import { useOpenModel } from "./use-model";

/** An enumeration with its values, one a line. */
export function AddEnumerationForm({ onDone }: AddFormProps) {
  const { actions } = useOpenModel();
  const [name, setName] = useState("");
  const [text, setText] = useState("");
  const [description, setDescription] = useState("");
  const values = parseEnumeration(text);

  function add(): void {
    const trimmed = name.trim();
    const made = actions.addEnumeration({
      name: trimmed,
      values,
      ...(description.trim() === "" ? {} : { description: [{ text: description.trim() }] }),
    });
    if (made !== undefined) onDone(trimmed, true);
  }

  return (
    <AddForm onSubmit={add} label="Add enumeration">
      <NameField value={name} onChange={setName} />
      <Field label="Values, one a line" hint={values.length === 0 ? "Off, or with its number: 2 Running" : values.map((v) => `${v.value} ${v.name}`).join(" · ")}>
        {(control) => <TextArea {...control} rows={6} value={text} onChange={(event) => setText(event.currentTarget.value)} />}
      </Field>
      <DescriptionField value={description} onChange={setDescription} />
    </AddForm>
  );
}
