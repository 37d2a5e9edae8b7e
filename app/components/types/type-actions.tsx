import { useState, type ReactNode } from "react";
import { useNavigate } from "react-router";
import { listParents } from "~/components/model/list-parents";
import { OptionalMembers } from "~/components/model/optional-members";
import type { OpenModel } from "~/components/model/use-model";
import { Button } from "~/components/ui/button";
import { Field, Input, Select } from "~/components/ui/field";
import { Segments } from "~/components/ui/segments";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getDisplayName } from "~/domain/address-space/browse";
import type { Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardReferenceType } from "~/domain/address-space/standard-ids";
import { findAgreedName, listImplementers, listTypeUses, proposeInstanceName, proposeSubtypeName, type TypeUse } from "./type-uses";

const words: Record<TypeUse, { label: string; about: string }> = {
  derive: { label: "Derive", about: "A subtype of your own: it inherits every member and adds more." },
  instantiate: { label: "Instantiate", about: "One of it, with its mandatory members made to the whole depth." },
  implement: { label: "Implement", about: "Your type then has the members of the interface as its own." },
  "add-in": { label: "Use as add-in", about: "Hung on by HasAddIn: clients find it there by its agreed name." },
};

type Props = { model: OpenModel; space: AddressSpace; type: Node; editBlockedBy: string | undefined };

/** Derive, instantiate, implement, use as add-in: what is lawful for this type. */
export function TypeActions({ model, space, type, editBlockedBy }: Props) {
  const uses = listTypeUses(space, type);
  const [chosen, setChosen] = useState<TypeUse>("derive");
  const use = uses.includes(chosen) ? chosen : "derive";
  const navigate = useNavigate();
  const show = (key: NodeKey | undefined) => {
    if (key !== undefined)
      void navigate(`/models/${model.workspace.model.id}/register?node=${encodeURIComponent(key)}`);
  };
  const props = { model, space, type, editBlockedBy, onMade: show };
  return (
    <section aria-label="Use this type" className="grid content-start gap-3 border-t-[1.5px] border-ink pt-3">
      <h2 className="text-lead font-semibold">Use it</h2>
      <Segments
        label="Use"
        value={use}
        onChange={setChosen}
        className="justify-self-start"
        options={uses.map((value) => ({ value, label: words[value].label }))}
      />
      <p className="text-small text-ink-2">{words[use].about}</p>
      {use === "derive" ? <DeriveForm key={type.key} {...props} /> : null}
      {use === "implement" ? <ImplementForm key={type.key} {...props} /> : null}
      {use === "instantiate" ? <InstantiateForm key={type.key} {...props} /> : null}
      {use === "add-in" ? <InstantiateForm key={`add-in ${type.key}`} {...props} asAddIn /> : null}
    </section>
  );
}

type FormProps = Props & { onMade: (key: NodeKey | undefined) => void };

function UseForm({ onSubmit, children }: { onSubmit: () => void; children: ReactNode }) {
  return (
    <form
      className="grid gap-3"
      onSubmit={(event) => {
        event.preventDefault();
        onSubmit();
      }}
    >
      {children}
    </form>
  );
}

function DeriveForm({ model, type, editBlockedBy, onMade }: FormProps) {
  const [name, setName] = useState(proposeSubtypeName(type.browseName.name));
  return (
    <UseForm onSubmit={() => onMade(model.actions.addType({ supertype: type.key, name: name.trim() }))}>
      <Field label="Name of the subtype">
        {(tied) => <Input {...tied} value={name} onChange={(event) => setName(event.currentTarget.value)} />}
      </Field>
      <Button type="submit" tone="main" blockedBy={editBlockedBy} className="justify-self-start">
        Derive
      </Button>
    </UseForm>
  );
}

function ImplementForm({ model, space, type, editBlockedBy, onMade }: FormProps) {
  const implementers = listImplementers(space);
  const [source, setSource] = useState<NodeKey | undefined>(implementers[0]?.key);
  const missing = implementers.length === 0 ? "the model has no ObjectType of its own yet" : undefined;
  return (
    <UseForm
      onSubmit={() => {
        if (source === undefined) return;
        model.actions.connect({ source, type: StandardReferenceType.HasInterface, target: type.key });
        onMade(source);
      }}
    >
      <Field label="Implemented by">
        {(tied) => (
          <Select
            {...tied}
            value={source ?? ""}
            onChange={(event) => setSource(event.currentTarget.value as NodeKey)}
            disabled={implementers.length === 0}
          >
            {implementers.map((choice) => (
              <option key={choice.key} value={choice.key}>
                {choice.label}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <Button type="submit" tone="main" blockedBy={editBlockedBy ?? missing} className="justify-self-start">
        Implement {getDisplayName(type)}
      </Button>
    </UseForm>
  );
}

function InstantiateForm({ model, space, type, editBlockedBy, onMade, asAddIn }: FormProps & { asAddIn?: boolean }) {
  const parents = listParents(space);
  const [parent, setParent] = useState<NodeKey | undefined>(parents[0]?.key);
  const agreed = asAddIn ? findAgreedName(space, type.key) : undefined;
  const [name, setName] = useState(agreed?.name?.name ?? proposeInstanceName(type.browseName.name));
  const [optional, setOptional] = useState<readonly string[]>([]);
  const isVariable = type.nodeClass === "VariableType";

  function make(): void {
    if (parent === undefined) return;
    const isAgreed = agreed?.name?.name === name.trim();
    const intent = {
      parent,
      name: name.trim(),
      typeDefinition: type.key,
      optional,
      ...(isAgreed && agreed.name ? { namespaceUri: agreed.name.namespaceUri } : {}),
    };
    const made = isVariable
      ? model.actions.addVariable(intent)
      : model.actions.addObject({ ...intent, ...(asAddIn ? { referenceType: StandardReferenceType.HasAddIn } : {}) });
    onMade(made);
  }
  return (
    <UseForm onSubmit={make}>
      <Field label="Below">
        {(tied) => (
          <Select {...tied} value={parent ?? ""} onChange={(event) => setParent(event.currentTarget.value as NodeKey)}>
            {parents.map((choice) => (
              <option key={choice.key} value={choice.key}>
                {choice.label}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <Field label="Name">
        {(tied) => <Input {...tied} value={name} onChange={(event) => setName(event.currentTarget.value)} />}
      </Field>
      {parent === undefined || isVariable ? null : (
        <OptionalMembers space={space} parent={parent} type={type.key} chosen={optional} onChoose={setOptional} />
      )}
      <Button
        type="submit"
        tone="main"
        blockedBy={
          editBlockedBy ??
          (asAddIn && !agreed
            ? "its model gives add-ins of it no name (DefaultInstanceBrowseName, OPC 10000-3 §4.10.3)"
            : parent === undefined
              ? "nothing to hang it below"
              : undefined)
        }
        className="justify-self-start"
      >
        {asAddIn ? "Add as add-in" : "Instantiate"}
      </Button>
    </UseForm>
  );
}
