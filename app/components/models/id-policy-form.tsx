import { useState } from "react";
import { Form } from "react-router";
import { Button } from "~/components/ui/button";
import { Field, Input, Select } from "~/components/ui/field";
import { Notice } from "~/components/ui/notice";
import {
  NODE_CLASSES,
  NUMBERS,
  PATH_PLACE,
  PATH_SEPARATORS,
  type IdPolicy,
  type IdRange,
} from "~/domain/address-space/id-policy";
import type { NodeClass } from "~/domain/address-space/node";

type Props = {
  policy: IdPolicy | undefined;
  refusal: string | undefined;
  isSending: boolean;
  editBlockedBy: string | undefined;
};

const KINDS: readonly { readonly kind: IdPolicy["kind"]; readonly label: string; readonly hint: string }[] = [
  { kind: "numbers", label: "Numbers, one after the other", hint: "The next number that was never given." },
  {
    kind: "ranges",
    label: "Numbers, a range for each node class",
    hint: "A class without a range takes the next number of all.",
  },
  { kind: "paths", label: "Paths of names for machines", hint: "Types and what stands in them are numbered." },
];

/** Usual in published NodeSets, where the first figure tells the class; instances are more, so they get more room. */
const SUGGESTED: Readonly<Record<NodeClass, IdRange>> = {
  ObjectType: { from: 1001, to: 1999 },
  VariableType: { from: 2001, to: 2999 },
  DataType: { from: 3001, to: 3999 },
  ReferenceType: { from: 4001, to: 4999 },
  Object: { from: 50_001, to: 59_999 },
  Variable: { from: 60_001, to: 69_999 },
  Method: { from: 70_001, to: 79_999 },
  View: { from: 80_001, to: 80_999 },
};

/** How new nodes of the model get their NodeIds. */
export function IdPolicyForm({ policy = NUMBERS, refusal, isSending, editBlockedBy }: Props) {
  const [kind, setKind] = useState(policy.kind);
  const isBlocked = editBlockedBy !== undefined;
  return (
    <Form method="post" className="grid gap-3">
      <input type="hidden" name="intent" value="set-id-policy" />
      {refusal ? <Notice tone="error" title={refusal} live /> : null}
      <Field label="New nodes get" hint={KINDS.find((one) => one.kind === kind)?.hint}>
        {(tied) => (
          <Select
            {...tied}
            name="kind"
            value={kind}
            disabled={isBlocked}
            onChange={(event) => setKind(KINDS.find((one) => one.kind === event.target.value)?.kind ?? "numbers")}
          >
            {KINDS.map((one) => (
              <option key={one.kind} value={one.kind}>
                {one.label}
              </option>
            ))}
          </Select>
        )}
      </Field>
      {kind === "ranges" ? <Ranges policy={policy} isBlocked={isBlocked} /> : null}
      {kind === "paths" ? <Paths policy={policy} isBlocked={isBlocked} /> : null}
      {isBlocked ? null : (
        <Button type="submit" busy={isSending} className="justify-self-start">
          Set NodeIds
        </Button>
      )}
    </Form>
  );
}

function Ranges({ policy, isBlocked }: { policy: IdPolicy; isBlocked: boolean }) {
  const ranges = policy.kind === "ranges" ? policy.ranges : SUGGESTED;
  return (
    <fieldset className="grid grid-cols-[minmax(0,1fr)_104px_auto_104px] items-center gap-x-2 gap-y-1">
      <legend className="mb-1 text-note font-medium text-ink-2">Ranges, both ends included; empty is none</legend>
      {NODE_CLASSES.map((nodeClass) => (
        <RangeRow key={nodeClass} nodeClass={nodeClass} range={ranges[nodeClass]} isBlocked={isBlocked} />
      ))}
    </fieldset>
  );
}

function RangeRow({
  nodeClass,
  range,
  isBlocked,
}: {
  nodeClass: NodeClass;
  range: IdRange | undefined;
  isBlocked: boolean;
}) {
  const end = (name: "from" | "to") => (
    <Input
      name={`${name}.${nodeClass}`}
      aria-label={`${nodeClass} ${name}`}
      defaultValue={range?.[name] ?? ""}
      inputMode="numeric"
      pattern="[0-9]{1,10}"
      readOnly={isBlocked}
      mono
    />
  );
  return (
    <>
      <span className="text-small">{nodeClass}</span>
      {end("from")}
      <span aria-hidden className="text-ink-3">
        …
      </span>
      {end("to")}
    </>
  );
}

function Paths({ policy, isBlocked }: { policy: IdPolicy; isBlocked: boolean }) {
  const { pattern, separator } = policy.kind === "paths" ? policy : { pattern: PATH_PLACE, separator: "." };
  const [example, setExample] = useState({ pattern, separator });
  const names = ["B1", "Gearbox", "Vibration"].join(example.separator);
  return (
    <div className="grid grid-cols-[minmax(0,1fr)_88px] gap-2">
      <Field
        label="Pattern"
        hint={
          <>
            As <span className="font-mono">s={example.pattern.replace(PATH_PLACE, names)}</span>
          </>
        }
      >
        {(tied) => (
          <Input
            {...tied}
            name="pattern"
            defaultValue={pattern}
            maxLength={200}
            required
            readOnly={isBlocked}
            onChange={(event) => setExample({ ...example, pattern: event.target.value })}
            mono
          />
        )}
      </Field>
      <Field label="Separator">
        {(tied) => (
          <Select
            {...tied}
            name="separator"
            defaultValue={separator}
            disabled={isBlocked}
            onChange={(event) => setExample({ ...example, separator: event.target.value })}
          >
            {PATH_SEPARATORS.map((one) => (
              <option key={one}>{one}</option>
            ))}
          </Select>
        )}
      </Field>
    </div>
  );
}
