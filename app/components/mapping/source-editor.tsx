import { Select, Field, Checkbox } from "~/components/ui/field";
import type { Target } from "~/domain/mapping/list-targets";
import { octetOrders, registerTypes, type SourceReference } from "~/domain/mapping/mapping";
import { Choice } from "./choice";
import { CommitInput, FigureInput } from "./commit-input";
import { sourceKinds, tableWords, type Roles } from "./describe-source";
import { viewRoleFrame } from "./view-role-frame";
import { FormulaFields } from "./formula-fields";
import type { Member } from "./mapping-scene";
import { makeReference } from "./make-reference";
import { parseFigure } from "./parse-figure";

type Props = {
  source: SourceReference;
  roles: Roles;
  members: readonly Member[];
  target: Target;
  onChange: (next: SourceReference) => void;
};

/** Where the value comes from: any kind of the closed union, with its own fields. */
export function SourceEditor(props: Props) {
  const { source, roles, onChange } = props;
  return (
    <div className="grid gap-2">
      <Field label="Fed by">
        {(tied) => (
          <Select
            {...tied}
            size="small"
            value={source.kind}
            onChange={(event) => onChange(makeReference(event.currentTarget.value as SourceReference["kind"], roles))}
          >
            {sourceKinds.map(([kind, word]) => (
              <option key={kind} value={kind}>
                {word}
              </option>
            ))}
          </Select>
        )}
      </Field>
      {"role" in source ? (
        <Choice
          label="Role"
          value={source.role}
          options={listChoices([...roles.keys()], source.role)}
          onChange={(role) => onChange({ ...source, role } as SourceReference)}
        />
      ) : null}
      <KindFields {...props} />
    </div>
  );
}

function KindFields({ source, roles, members, target, onChange }: Props) {
  switch (source.kind) {
    case "process-data":
      return <ProcessDataFields source={source} roles={roles} onChange={onChange} />;
    case "parameter":
      return (
        <div className="grid grid-cols-2 gap-3">
          <FigureInput
            label="Index"
            isWhole
            low={0}
            high={65_535}
            value={source.index}
            onCommit={(index) => onChange({ ...source, index })}
          />
          <FigureInput
            label="Subindex, 0 the whole"
            isWhole
            low={0}
            high={255}
            value={source.subindex}
            onCommit={(subindex) => onChange({ ...source, subindex })}
          />
        </div>
      );
    case "validity":
      return <DirectionChoice value={source.direction} onChange={(direction) => onChange({ ...source, direction })} />;
    case "device-status":
      return (
        <fieldset className="grid gap-1">
          <legend className="text-note font-medium text-ink-2">Worst status of</legend>
          {[...roles].map(([name]) => (
            <Checkbox
              key={name}
              label={name}
              checked={source.roles.includes(name)}
              onChange={(event) => {
                const next = event.currentTarget.checked
                  ? [...source.roles, name]
                  : source.roles.filter((role) => role !== name);
                if (next.length > 0) onChange({ ...source, roles: next });
              }}
            />
          ))}
        </fieldset>
      );
    case "event-code":
      return (
        <CommitInput
          label="Event code"
          mono
          value={`0x${source.code.toString(16).toUpperCase().padStart(4, "0")}`}
          hint="True from when it appears until it disappears."
          onCommit={(text) => {
            const code = parseFigure(text);
            if (code === undefined || !Number.isInteger(code) || code < 0 || code > 65_535)
              return "a code from 0x0000 to 0xFFFF";
            onChange({ ...source, code });
            return undefined;
          }}
        />
      );
    case "register":
      return <RegisterFields source={source} onChange={onChange} />;
    case "tag":
      return <TextOf label="Name of the tag" value={source.name} onChange={(name) => onChange({ ...source, name })} />;
    case "json-path":
      return (
        <TextOf
          label="Members from the root, parted by /"
          value={source.path.join("/")}
          onChange={(text) =>
            onChange({ ...source, path: text.split("/").map((step) => (/^\d+$/.test(step) ? Number(step) : step)) })
          }
        />
      );
    case "opc-ua-node":
      return (
        <TextOf label="NodeId with nsu=" value={source.nodeId} onChange={(nodeId) => onChange({ ...source, nodeId })} />
      );
    case "constant":
      return (
        <CommitInput
          label="Value"
          mono
          value={String(source.value)}
          onCommit={(text) => {
            const value = toConstant(text, target);
            if (value === undefined) return `no value of ${target.dataTypeName}`;
            onChange({ ...source, value });
            return undefined;
          }}
        />
      );
    case "formula":
      return <FormulaFields source={source} roles={roles} members={members} target={target} onChange={onChange} />;
    case "port-status":
      return <p className="text-note text-ink-3">The state of the port: 4 is operate (OPC 30120, port status).</p>;
  }
}

function toConstant(text: string, target: Target): number | boolean | string | undefined {
  if (target.builtInType === "String" || target.builtInType === "LocalizedText") return text;
  if (target.builtInType === "Boolean") return text === "true" ? true : text === "false" ? false : undefined;
  return parseFigure(text);
}

type Of<K extends SourceReference["kind"]> = {
  source: Extract<SourceReference, { kind: K }>;
  onChange: Props["onChange"];
};

function ProcessDataFields({ source, roles, onChange }: Of<"process-data"> & { roles: Roles }) {
  const role = roles.get(source.role);
  const fields = (role && viewRoleFrame(role, source.direction)?.fields) ?? [];
  return (
    <div className="grid grid-cols-[1fr_2fr] gap-3">
      <DirectionChoice value={source.direction} onChange={(direction) => onChange({ ...source, direction })} />
      <Choice
        label="Field"
        value={String(source.subindex)}
        options={fields.map((field) => [String(field.subindex), `${field.name}, ${field.typeText}`] as const)}
        onChange={(subindex) => onChange({ ...source, subindex: Number(subindex) })}
      />
    </div>
  );
}

function RegisterFields({ source, onChange }: Of<"register">) {
  const isBit = source.table === "coil" || source.table === "discrete-input";
  const { bit: _bit, ...withoutBit } = source;
  return (
    <div className="grid grid-cols-2 gap-x-3 gap-y-2">
      <Choice
        label="Table"
        value={source.table}
        options={Object.entries(tableWords) as [typeof source.table, string][]}
        onChange={(table) => onChange({ ...source, table })}
      />
      <FigureInput
        label="Address on the wire, from 0"
        isWhole
        low={0}
        high={65_535}
        value={source.address}
        hint={`${source.address + 1} where a document counts from 1`}
        onCommit={(address) => onChange({ ...source, address })}
      />
      {isBit ? null : (
        <>
          <Choice
            label="Type"
            value={source.type ?? "UInt16"}
            options={registerTypes.map((type) => [type, type] as const)}
            onChange={(type) => onChange({ ...source, type })}
          />
          <Choice
            label="Octets, A the highest"
            value={source.order ?? "ABCD"}
            options={octetOrders.map((order) => [order, order] as const)}
            onChange={(order) => onChange({ ...source, order })}
          />
          <FigureInput
            label="Bit (empty: the whole)"
            isWhole
            low={0}
            high={15}
            value={source.bit}
            onClear={() => onChange(withoutBit)}
            onCommit={(bit) => onChange({ ...source, bit })}
          />
        </>
      )}
    </div>
  );
}

export function DirectionChoice({ value, onChange }: { value: "in" | "out"; onChange: (value: "in" | "out") => void }) {
  return (
    <Choice
      label="Direction"
      value={value}
      options={[
        ["in", "in"],
        ["out", "out, as set"],
      ]}
      onChange={onChange}
    />
  );
}

function TextOf({ label, value, onChange }: { label: string; value: string; onChange: (text: string) => void }) {
  return (
    <CommitInput
      label={label}
      mono
      value={value}
      onCommit={(text) => {
        if (text.trim() === "") return "may not be empty";
        onChange(text.trim());
        return undefined;
      }}
    />
  );
}

/** The present value stays in the list also when it is gone from the model. */
function listChoices(names: readonly string[], present: string): (readonly [string, string])[] {
  const all = names.includes(present) ? names : [present, ...names];
  return all.map((name) => [name, names.includes(name) ? name : `${name} (gone)`] as const);
}
