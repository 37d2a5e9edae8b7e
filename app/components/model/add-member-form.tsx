import { useState } from "react";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardDataType, StandardType } from "~/domain/address-space/standard-ids";
import { Field, Input } from "../ui/field";
import { AddForm, DescriptionField, NameField, ParentField, RuleField } from "./add-form-parts";
import type { AddFormProps } from "./add-request";
import { parseRange, type UnitFacts } from "./analog-facts";
import { isInType } from "./list-parents";
import { listRoots } from "./list-roots";
import { RULE_KEYS, type RuleName } from "./member-facts";
import { OptionalMembers } from "./optional-members";
import { TypeField } from "./type-search";
import { UnitField } from "./unit-search";
import { useOpenModel, useSpace } from "./use-model";

/** A Variable, a Property or an Object below a node. Mandatory members of its type are made with it. */
export function AddMemberForm({ request, onDone }: AddFormProps) {
  const { actions } = useOpenModel();
  const space = useSpace();
  const { kind } = request;
  const [name, setName] = useState("");
  const [parent, setParent] = useState(() => request.parent ?? listRoots(space).find((key) => !space.getNode(key)?.nodeClass.startsWith("Data")));
  const [type, setType] = useState<NodeKey>(request.base ?? (kind === "Object" ? StandardType.BaseObjectType : StandardType.AnalogUnitRangeType));
  const [dataType, setDataType] = useState<NodeKey>(kind === "Property" ? StandardDataType.String : StandardDataType.Float);
  const [unit, setUnit] = useState<UnitFacts>();
  const [rangeText, setRangeText] = useState("");
  const [rule, setRule] = useState<RuleName>("Mandatory");
  const [description, setDescription] = useState("");
  const [optional, setOptional] = useState<readonly string[]>([]);
  const [error, setError] = useState<string>();
  const range = parseRange(rangeText);
  const inType = isInType(space, parent);

  function add(): void {
    if (parent === undefined) {
      setError("Choose the node that it belongs to");
      return;
    }
    const shared = {
      parent,
      name: name.trim(),
      ...(inType ? { rule: RULE_KEYS[rule] } : {}),
      ...(description.trim() === "" ? {} : { description: [{ text: description.trim() }] }),
    };
    const analog = { ...(unit ? { unit: unit.information } : {}), ...(range ? { range } : {}) };
    const made =
      kind === "Object"
        ? actions.addObject({ ...shared, typeDefinition: type, optional })
        : kind === "Property"
          ? actions.addProperty({ ...shared, dataType })
          : actions.addVariable({ ...shared, typeDefinition: type, dataType, optional, ...analog });
    if (made === undefined) return;
    setError(undefined);
    setName("");
    setDescription("");
    setOptional([]);
    onDone(shared.name, false);
  }

  return (
    <AddForm onSubmit={add}>
      <NameField value={name} onChange={setName} error={error} />
      <ParentField space={space} value={parent} onChange={setParent} />
      {kind === "Property" ? null : (
        <Field label="Type">
          {({ id }) => (
            <TypeField
              id={id}
              label="Type"
              space={space}
              kind={kind === "Object" ? "ObjectType" : "VariableType"}
              concreteOnly={!inType}
              value={type}
              onPick={(picked) => {
                setType(picked);
                setOptional([]);
              }}
            />
          )}
        </Field>
      )}
      {kind === "Object" ? null : (
        <Field label="DataType">{({ id }) => <TypeField id={id} label="DataType" space={space} kind="DataType" value={dataType} onPick={setDataType} />}</Field>
      )}
      {kind === "Variable" ? (
        <div className="grid grid-cols-2 gap-2">
          <Field label="Unit" optional>
            {({ id }) => <UnitField id={id} label="Unit" value={unit} onPick={setUnit} />}
          </Field>
          <Field label="EURange" optional errors={rangeText !== "" && !range ? ["Write min … max"] : undefined}>
            {(control) => <Input {...control} size="small" mono placeholder="min … max" value={rangeText} onChange={(event) => setRangeText(event.currentTarget.value)} />}
          </Field>
        </div>
      ) : null}
      {inType ? <RuleField value={rule} onChange={setRule} /> : null}
      <DescriptionField value={description} onChange={setDescription} />
      {parent !== undefined && kind !== "Property" ? <OptionalMembers space={space} parent={parent} type={type} chosen={optional} onChoose={setOptional} /> : null}
    </AddForm>
  );
}
