import { Field, Input, Select } from "~/components/ui/field";
import { Segments } from "~/components/ui/segments";
import { fillPattern, type NodeIdPolicy, type RollOutRow } from "~/domain/instantiation/roll-out-machines";

type Props = { policy: NodeIdPolicy; onChange: (policy: NodeIdPolicy) => void; example: RollOutRow | undefined };

const separators = [
  { value: ".", label: "dot" },
  { value: "/", label: "slash" },
  { value: "_", label: "underscore" },
] as const;

/** How the machines and what stands below them get their NodeIds. */
export function NodeIdChoice({ policy, onChange, example }: Props) {
  return (
    <div className="grid gap-2">
      <Segments
        label="NodeIds"
        className="justify-self-start"
        value={policy.kind}
        onChange={(kind) => onChange(kind === "numbers" ? { kind } : { kind, pattern: "{name}", separator: "." })}
        options={[
          { value: "numbers", label: "As the model has it" },
          { value: "path", label: "Path of names" },
        ]}
      />
      {policy.kind === "numbers" ? (
        <p className="text-note text-ink-3">As the page About of the model says; numbers one after the other unless it was changed there.</p>
      ) : (
        <>
          <div className="grid grid-cols-[minmax(0,1fr)_110px] gap-2">
            <Field label="NodeId pattern">
              {(tied) => (
                <Input {...tied} mono value={policy.pattern} maxLength={200} onChange={(event) => onChange({ ...policy, pattern: event.currentTarget.value })} />
              )}
            </Field>
            <Field label="Between names">
              {(tied) => (
                <Select
                  {...tied}
                  value={policy.separator}
                  onChange={(event) => onChange({ ...policy, separator: event.currentTarget.value })}
                >
                  {separators.map(({ value, label }) => (
                    <option key={value} value={value}>
                      {label}
                    </option>
                  ))}
                </Select>
              )}
            </Field>
          </div>
          <p className="text-note break-words text-ink-3">
            {"{name}, {serial} and {place} stand for the cells of the row. "}
            {example ? (
              <span className="font-mono">
                s={fillPattern(policy.pattern, example)}
                {policy.separator}Identification
              </span>
            ) : null}
          </p>
        </>
      )}
    </div>
  );
}
