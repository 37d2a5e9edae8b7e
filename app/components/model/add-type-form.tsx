import { useState } from "react";
import { StandardReferenceType, StandardType } from "~/domain/address-space/standard-ids";
import type { NodeKey } from "~/domain/address-space/node-id";
import { Checkbox, Field, Input } from "../ui/field";
import { AddForm, DescriptionField, NameField } from "./add-form-parts";
import type { AddFormProps } from "./add-request";
import { TypeField } from "./type-search";
import { useOpenModel, useSpace } from "./use-model";

type Kind = "ObjectType" | "VariableType" | "ReferenceType";

const ROOTS: Readonly<Record<Kind, NodeKey>> = {
  ObjectType: StandardType.BaseObjectType,
  VariableType: StandardType.BaseDataVariableType,
  ReferenceType: StandardReferenceType.HasComponent,
};

/** A type derived from any type of the loaded models. */
export function AddTypeForm({ request, onDone, kind }: AddFormProps & { kind: Kind }) {
  const { actions } = useOpenModel();
  const space = useSpace();
  const [name, setName] = useState("");
  const [supertype, setSupertype] = useState(request.base ?? ROOTS[kind]);
  const [isAbstract, setAbstract] = useState(false);
  const [symmetric, setSymmetric] = useState(false);
  const [inverseName, setInverseName] = useState("");
  const [description, setDescription] = useState("");

  function add(): void {
    const trimmed = name.trim();
    const made = actions.addType({
      supertype,
      name: trimmed,
      ...(isAbstract ? { isAbstract } : {}),
      ...(description.trim() === "" ? {} : { description: [{ text: description.trim() }] }),
      ...(kind !== "ReferenceType" ? {} : symmetric ? { symmetric } : { inverseName: [{ text: inverseName.trim() }] }),
    });
    if (made !== undefined) onDone(trimmed, true);
  }

  return (
    <AddForm onSubmit={add} label={`Add ${kind}`}>
      <NameField value={name} onChange={setName} />
      <Field label="Subtype of">{({ id }) => <TypeField id={id} label="Subtype of" space={space} kind={kind} value={supertype} onPick={setSupertype} />}</Field>
      {kind === "ReferenceType" ? (
        <>
          <Field label="Inverse name" hint="How the reference reads from its target">
            {(control) => <Input {...control} size="small" disabled={symmetric} value={inverseName} onChange={(event) => setInverseName(event.currentTarget.value)} />}
          </Field>
          <Checkbox label="Symmetric: reads the same from both ends" checked={symmetric} onChange={(event) => setSymmetric(event.currentTarget.checked)} />
        </>
      ) : null}
      <Checkbox label="Abstract: may not be instantiated" checked={isAbstract} onChange={(event) => setAbstract(event.currentTarget.checked)} />
      <DescriptionField value={description} onChange={setDescription} />
    </AddForm>
  );
}
