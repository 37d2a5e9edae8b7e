import { NODE_CLASSES, PATH_SEPARATORS, type IdRange, type PathSeparator } from "~/domain/address-space/id-policy";
import type { NodeClass } from "~/domain/address-space/node";
import type { ProposalRule } from "~/domain/editing/propose-node-ids";
import { Button } from "../ui/button";
import { Field, Input, Select } from "../ui/field";
import { Segments } from "../ui/segments";

/** All parts of the form are kept while another rule is looked at. */
export type RuleChoice = {
  readonly kind: ProposalRule["kind"];
  readonly from: number;
  readonly ranges: Readonly<Partial<Record<NodeClass, IdRange>>>;
  readonly separator: PathSeparator;
};

type Props = { choice: RuleChoice; onChange: (choice: RuleChoice) => void; onPropose: () => void; count: number };

/** The rule by which NodeIds are proposed for the rows that the filter leaves. */
export function RuleForm({ choice, onChange, onPropose, count }: Props) {
  return (
    <form
      className="flex flex-wrap items-end gap-3 border-y border-rule bg-bench px-3 py-2"
      aria-label="Rule"
      onSubmit={(event) => {
        event.preventDefault();
        onPropose();
      }}
    >
      <Segments
        label="Propose by"
        value={choice.kind}
        onChange={(kind) => onChange({ ...choice, kind })}
        options={[
          { value: "numbers", label: "Numbers from" },
          { value: "ranges", label: "A range for each class" },
          { value: "paths", label: "Path of names" },
        ]}
      />
      {choice.kind === "numbers" ? (
        <NumberField
          label="First number"
          value={choice.from}
          onChange={(from) => onChange({ ...choice, from: from ?? 1 })}
        />
      ) : choice.kind === "ranges" ? (
        NODE_CLASSES.map((nodeClass) => {
          const range = choice.ranges[nodeClass];
          return (
            <NumberField
              key={nodeClass}
              label={`${nodeClass} from`}
              value={range?.from}
              onChange={(from) => {
                const { [nodeClass]: _old, ...others } = choice.ranges;
                onChange({
                  ...choice,
                  ranges:
                    from === undefined
                      ? others
                      : { ...others, [nodeClass]: { from, to: Math.max(from, range?.to ?? 4_294_967_295) } },
                });
              }}
            />
          );
        })
      ) : (
        <Field label="Between names">
          {(control) => (
            <Select
              {...control}
              size="small"
              mono
              className="w-20!"
              value={choice.separator}
              onChange={(event) => onChange({ ...choice, separator: event.currentTarget.value as PathSeparator })}
            >
              {PATH_SEPARATORS.map((separator) => (
                <option key={separator}>{separator}</option>
              ))}
            </Select>
          )}
        </Field>
      )}
      <Button type="submit" size="small">
        Propose for {count} {count === 1 ? "node" : "nodes"}
      </Button>
      <span className="text-note text-ink-3">
        Nothing changes before you press Renumber. A NodeId can also be written into its row.
      </span>
    </form>
  );
}

function NumberField({
  label,
  value,
  onChange,
}: {
  label: string;
  value: number | undefined;
  onChange: (value: number | undefined) => void;
}) {
  return (
    <Field label={label}>
      {(control) => (
        <Input
          {...control}
          size="small"
          mono
          type="number"
          min={1}
          max={4_294_967_295}
          className="w-24! text-right"
          placeholder="stays"
          value={value ?? ""}
          onChange={(event) => {
            const next = event.currentTarget.valueAsNumber;
            if (event.currentTarget.value === "") onChange(undefined);
            else if (Number.isInteger(next) && next >= 1 && next <= 4_294_967_295) onChange(next);
          }}
        />
      )}
    </Field>
  );
}
