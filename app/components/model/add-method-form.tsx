import { Plus, X } from "lucide-react";
import { useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { Button } from "../ui/button";
import { Input } from "../ui/field";
import { AddForm, DescriptionField, NameField, ParentField, RuleField } from "./add-form-parts";
import type { AddFormProps } from "./add-request";
import { isInType } from "./list-parents";
import { listRoots } from "./list-roots";
import { RULE_KEYS, type RuleName } from "./member-facts";
import { TypeField } from "./type-search";
import { useOpenModel, useSpace } from "./use-model";

type Argument = { readonly name: string; readonly dataType: NodeKey };

/** A Method with what it takes and what it answers. */
export function AddMethodForm({ request, onDone }: AddFormProps) {
  const { actions } = useOpenModel();
  const space = useSpace();
  const [name, setName] = useState("");
  const [parent, setParent] = useState(() => request.parent ?? listRoots(space)[0]);
  const [input, setInput] = useState<readonly Argument[]>([]);
  const [output, setOutput] = useState<readonly Argument[]>([]);
  const [rule, setRule] = useState<RuleName>("Mandatory");
  const [description, setDescription] = useState("");
  const [error, setError] = useState<string>();
  const inType = isInType(space, parent);

  function add(): void {
    if (parent === undefined) {
      setError("Choose the node that it belongs to");
      return;
    }
    const trimmed = name.trim();
    const made = actions.addMethod({
      parent,
      name: trimmed,
      inputArguments: input.filter((argument) => argument.name.trim() !== ""),
      outputArguments: output.filter((argument) => argument.name.trim() !== ""),
      ...(inType ? { rule: RULE_KEYS[rule] } : {}),
      ...(description.trim() === "" ? {} : { description: [{ text: description.trim() }] }),
    });
    if (made === undefined) return;
    setError(undefined);
    setName("");
    setInput([]);
    setOutput([]);
    onDone(trimmed, false);
  }

  return (
    <AddForm onSubmit={add} label="Add Method">
      <NameField value={name} onChange={setName} error={error} />
      <ParentField space={space} value={parent} onChange={setParent} />
      <ArgumentRows space={space} title="Input argument" list={input} onChange={setInput} />
      <ArgumentRows space={space} title="Output argument" list={output} onChange={setOutput} />
      {inType ? <RuleField value={rule} onChange={setRule} /> : null}
      <DescriptionField value={description} onChange={setDescription} />
    </AddForm>
  );
}

type RowsProps = { space: AddressSpace; title: string; list: readonly Argument[]; onChange: (list: readonly Argument[]) => void };

function ArgumentRows({ space, title, list, onChange }: RowsProps) {
  const change = (index: number, part: Partial<Argument>): void => onChange(list.map((argument, i) => (i === index ? { ...argument, ...part } : argument)));
  return (
    <div className="grid gap-1" role="group" aria-label={`${title}s`}>
      <span className="text-note font-medium text-ink-2">{title}s</span>
      {list.map((argument, index) => (
        <div key={index} className="grid grid-cols-[1fr_1fr_auto] items-center gap-1.5">
          <Input size="small" aria-label={`Name of ${title.toLowerCase()} ${index + 1}`} autoFocus value={argument.name} onChange={(event) => change(index, { name: event.currentTarget.value })} />
          <TypeField label={`DataType of ${title.toLowerCase()} ${index + 1}`} space={space} kind="DataType" value={argument.dataType} onPick={(dataType) => change(index, { dataType })} />
          <button type="button" aria-label={`Remove ${title.toLowerCase()} ${index + 1}`} className="text-ink-3 hover:text-error" onClick={() => onChange(list.filter((_, i) => i !== index))}>
            <X size={12} aria-hidden />
          </button>
        </div>
      ))}
      <span>
        <Button size="small" tone="bare" icon={Plus} className="-ml-1.5" onClick={() => onChange([...list, { name: "", dataType: StandardDataType.Double }])}>
          {title}
        </Button>
      </span>
    </div>
  );
}
