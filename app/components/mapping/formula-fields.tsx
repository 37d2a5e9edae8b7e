import { Plus, X } from "lucide-react";
import { Button, IconButton } from "~/components/ui/button";
import { Field, Select } from "~/components/ui/field";
import { formatProblem } from "~/domain/core/problem-texts";
import { compileFormula } from "~/domain/mapping/formula";
import type { Target } from "~/domain/mapping/list-targets";
import type { SourceReference } from "~/domain/mapping/mapping";
import { CommitInput } from "./commit-input";
import { describeSource, type Roles } from "./describe-source";
import { viewRoleFrame } from "./view-role-frame";
import type { Member } from "./mapping-scene";

type Formula = Extract<SourceReference, { kind: "formula" }>;
type Input = Formula["inputs"][string];
type Props = {
  source: Formula;
  roles: Roles;
  members: readonly Member[];
  target: Target;
  onChange: (next: Formula) => void;
};

/** An expression over named inputs: other members of the type, or fields of sources. */
export function FormulaFields({ source, roles, members, target, onChange }: Props) {
  const names = Object.keys(source.inputs);
  const options = listInputs(roles, members, target);
  const set = (inputs: Formula["inputs"]) => onChange({ ...source, inputs });
  const replace = (name: string, next: string, input: Input) =>
    set(
      Object.fromEntries(
        Object.entries(source.inputs).map(([key, old]) => (key === name ? [next, input] : [key, old])),
      ),
    );
  return (
    <div className="grid gap-2">
      <CommitInput
        label="Expression"
        mono
        value={source.expression}
        hint="+ − * / ^, comparisons, a ? b : c, abs min max round sqrt exp log sin cos"
        onCommit={(text) => {
          const compiled = compileFormula(text.replace(/−/g, "-"), names);
          if (!compiled.ok) return compiled.problems.map(formatProblem).join(" ");
          onChange({ ...source, expression: text.replace(/−/g, "-") });
          return undefined;
        }}
      />
      <ul className="grid gap-1">
        {Object.entries(source.inputs).map(([name, input]) => (
          <li key={name} className="grid grid-cols-[90px_1fr_24px] items-end gap-2">
            <CommitInput
              label="Name"
              mono
              value={name}
              onCommit={(text) => {
                if (!/^[A-Za-z_][A-Za-z0-9_]*$/.test(text)) return "letters, digits, _";
                if (names.includes(text)) return "is used";
                replace(name, text, input);
                return undefined;
              }}
            />
            <Field label="is">
              {(tied) => (
                <Select
                  {...tied}
                  size="small"
                  value={JSON.stringify(input)}
                  onChange={(event) => replace(name, name, JSON.parse(event.currentTarget.value) as Input)}
                >
                  {withPresent(options, input, roles).map(({ value, label }) => (
                    <option key={value} value={value}>
                      {label}
                    </option>
                  ))}
                </Select>
              )}
            </Field>
            <IconButton
              icon={X}
              size="small"
              label={`Remove the input ${name}`}
              onClick={() => set(Object.fromEntries(Object.entries(source.inputs).filter(([key]) => key !== name)))}
            />
          </li>
        ))}
      </ul>
      <Button
        size="small"
        icon={Plus}
        className="justify-self-start"
        {...(options.length === 0 ? { blockedBy: "nothing is fed yet that a formula could read" } : {})}
        onClick={() => {
          const [first] = options;
          if (first) set({ ...source.inputs, [makeName(names)]: JSON.parse(first.value) as Input });
        }}
      >
        Input
      </Button>
    </div>
  );
}

type InputOption = { readonly value: string; readonly label: string };

/** Fed members first, then every field of every source. */
function listInputs(roles: Roles, members: readonly Member[], target: Target): InputOption[] {
  const fed = members
    .filter((member) => member.row && member.target.target !== target.target)
    .map((member) => ({
      value: JSON.stringify({ kind: "member", target: member.target.target }),
      label: member.target.path,
    }));
  const fields = [...roles].flatMap(([role, value]) =>
    (["in", "out"] as const).flatMap((direction) =>
      (viewRoleFrame(value, direction)?.fields ?? []).map((field) => ({
        value: JSON.stringify({ kind: "process-data", role, direction, subindex: field.subindex }),
        label: `${role} · ${field.name}`,
      })),
    ),
  );
  return [...fed, ...fields];
}

function withPresent(options: readonly InputOption[], input: Input, roles: Roles): readonly InputOption[] {
  const value = JSON.stringify(input);
  if (options.some((option) => option.value === value)) return options;
  const label = input.kind === "member" ? `${input.target} (gone)` : describeSource(input, roles);
  return [{ value, label }, ...options];
}

function makeName(names: readonly string[]): string {
  return [..."xyzabcdefghijklmnopqrstuvw"].find((letter) => !names.includes(letter)) ?? `x${names.length}`;
}
