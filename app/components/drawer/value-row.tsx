import { ListTree, X } from "lucide-react";
import { useEffect, useId, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getDataType, type VariableNode, type VariableTypeNode } from "~/domain/address-space/node";
import { setValue } from "~/domain/editing/commands/set-value";
import type { BuiltInType, Scalar, Variant } from "~/domain/nodeset/values/variant";
import { isPlainValue } from "../model/plain-value";
import { getDataTypes, readTypedValue } from "../model/read-typed-value";
import { useOpenModel } from "../model/use-model";
import { formatValueText } from "../model/value-text";
import { Button, IconButton } from "../ui/button";
import { Input, Select } from "../ui/field";
import { formatLeaf, parseLeaf, TEXT_TYPES } from "../values/leaf-text";
import { isUnfinished } from "../values/value-draft";

type Props = {
  id: string;
  space: AddressSpace;
  node: VariableNode | VariableTypeNode;
  readOnly: boolean;
  onOpen: () => void;
};

/** The value in one row: one text or choice is edited here, everything else on the bench that the button opens. */
export function ValueRow({ id, space, node, readOnly, onOpen }: Props) {
  const { actions } = useOpenModel();
  const types = getDataTypes(space);
  const dataType = getDataType(node);
  const value = readTypedValue(space, node);
  const type = value?.type ?? types.findBuiltInType(dataType);
  const isPlain = isPlainValue(space, node);
  const names = types.findEnumerationNames(dataType);
  const take = (next: Variant | undefined): void =>
    void actions.apply("set-value", (current, context) =>
      setValue(current, context, { node: node.key, ...(next ? { value: next } : {}) }),
    );
  const one = (item: Scalar): Variant => ({ type, shape: "scalar", value: item }) as Variant;
  const item = value?.shape === "scalar" ? value.value : undefined;

  return (
    <div className="flex items-start gap-1">
      <div className="min-w-0 flex-1">
        {isPlain && type === "Boolean" ? (
          <ChoiceField
            id={id}
            value={item === undefined ? "" : String(item)}
            readOnly={readOnly}
            choices={[
              ["true", "true"],
              ["false", "false"],
            ]}
            onPick={(text) => take(text === "" ? undefined : one(text === "true"))}
          />
        ) : isPlain && names && (item === undefined || names.has(item as number)) ? (
          <ChoiceField
            id={id}
            value={item === undefined ? "" : String(item)}
            readOnly={readOnly}
            choices={[...names].map(([number, name]) => [String(number), `${name} (${number})`])}
            onPick={(text) => take(text === "" ? undefined : one(Number(text)))}
          />
        ) : isPlain && type !== undefined && TEXT_TYPES.has(type) && !String(item ?? "").includes("\n") ? (
          <PlainField
            id={id}
            type={type}
            item={item}
            readOnly={readOnly}
            onTake={(next) => take(next === undefined ? undefined : one(next))}
          />
        ) : (
          <Input
            id={id}
            size="small"
            mono
            readOnly
            value={formatValueText(space, node)}
            placeholder="none"
            onDoubleClick={onOpen}
          />
        )}
      </div>
      <Button
        size="small"
        icon={ListTree}
        aria-label="Open the value"
        title="All of the value, in a form"
        onClick={onOpen}
      >
        {readOnly ? "Show" : "Edit"}
      </Button>
      {node.value && !readOnly ? (
        <IconButton size="small" icon={X} label="Take the value away" onClick={() => take(undefined)} />
      ) : null}
    </div>
  );
}

type ChoiceProps = {
  id: string;
  value: string;
  readOnly: boolean;
  choices: readonly (readonly [string, string])[];
  onPick: (value: string) => void;
};

function ChoiceField({ id, value, readOnly, choices, onPick }: ChoiceProps) {
  return (
    <Select
      id={id}
      size="small"
      value={value}
      disabled={readOnly}
      onChange={(event) => onPick(event.currentTarget.value)}
    >
      <option value="">none</option>
      {choices.map(([choice, label]) => (
        <option key={choice} value={choice}>
          {label}
        </option>
      ))}
    </Select>
  );
}

type PlainProps = {
  id: string;
  type: BuiltInType;
  item: Scalar | undefined;
  readOnly: boolean;
  onTake: (item: Scalar | undefined) => void;
};

/** Taken when it is left or Enter is pressed; a text that is no value stays, with the reason. */
function PlainField({ id, type, item, readOnly, onTake }: PlainProps) {
  const reasonId = useId();
  const shown = item === undefined ? "" : formatLeaf(item);
  const [text, setText] = useState(shown);
  const [reason, setReason] = useState<string>();
  useEffect(() => {
    setText(shown);
    setReason(undefined);
  }, [shown]);

  function commit(): void {
    if (readOnly || text === shown) {
      setReason(undefined);
      return;
    }
    if (text === "" && type !== "String") {
      onTake(undefined);
      return;
    }
    const next = parseLeaf(type, text);
    if (isUnfinished(next)) setReason(next.reason);
    else onTake(next);
  }
  return (
    <>
      <Input
        id={id}
        size="small"
        mono
        value={text}
        readOnly={readOnly}
        placeholder={item === null ? "null" : "none"}
        spellCheck={false}
        autoComplete="off"
        {...(reason === undefined ? {} : { "aria-invalid": true, "aria-describedby": reasonId })}
        onChange={(event) => setText(event.currentTarget.value)}
        onBlur={commit}
        onKeyDown={(event) => {
          event.stopPropagation();
          if (event.key === "Enter") commit();
          if (event.key !== "Escape") return;
          setText(shown);
          setReason(undefined);
        }}
      />
      {reason === undefined ? null : (
        <p id={reasonId} role="alert" className="mt-0.5 text-note text-error">
          {reason}
        </p>
      )}
    </>
  );
}
