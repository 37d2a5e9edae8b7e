import { Plus, X } from "lucide-react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { DataTypeField, DataTypeNode } from "~/domain/address-space/node";
import { findText } from "~/domain/address-space/qualified-name";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { isSubtypeOf } from "~/domain/address-space/type-hierarchy";
import { getNodeName } from "../model/member-facts";
import { useOpenModel } from "../model/use-model";
import { Button } from "../ui/button";
import { CommitField } from "./particular";

/** The values of an enumeration, edited in place; the fields of a structure are read. */
export function EnumerationTable({ space, node, readOnly }: { space: AddressSpace; node: DataTypeNode; readOnly: boolean }) {
  const { actions } = useOpenModel();
  const isEnumeration = isSubtypeOf(space, node.key, StandardDataType.Enumeration);
  const fields = node.definition?.fields ?? [];
  if (!isEnumeration) return <StructureTable space={space} fields={fields} />;
  const set = (next: readonly DataTypeField[]): void => actions.setEnumeration(node.key, next);
  const change = (index: number, part: Partial<DataTypeField>): void => set(fields.map((field, i) => (i === index ? { ...field, ...part } : field)));

  function add(): void {
    const value = fields.reduce((highest, field) => Math.max(highest, field.value ?? -1), -1) + 1;
    set([...fields, { name: `State${value}`, value }]);
  }

  return (
    <section aria-label="Enumeration">
      <h3>
        Enumeration values <span className="font-mono font-normal">{fields.length}</span>
      </h3>
      <table className="small-table" aria-label="Enumeration values">
        <colgroup>
          <col className="w-16" />
          <col className="w-[34%]" />
          <col />
          <col className="w-7" />
        </colgroup>
        <thead>
          <tr>
            <th scope="col">Value</th>
            <th scope="col">Name</th>
            <th scope="col">Description</th>
            <th scope="col">
              <span className="sr-only">Remove</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {fields.map((field, index) => (
            <tr key={index}>
              <td>
                <CommitField isBare
                  label={`Value of ${field.name}`}
                  mono
                  value={String(field.value ?? 0)}
                  readOnly={readOnly}
                  onCommit={(text) => {
                    const value = Number(text);
                    if (Number.isSafeInteger(value)) change(index, { value });
                  }}
                />
              </td>
              <td>
                <CommitField isBare label={`Name of value ${field.value ?? 0}`} value={field.name} readOnly={readOnly} onCommit={(name) => change(index, { name })} />
              </td>
              <td>
                <CommitField isBare
                  label={`Description of ${field.name}`}
                  value={findText(field.description ?? []) ?? ""}
                  readOnly={readOnly}
                  onCommit={(text) => change(index, { description: text === "" ? [] : [{ text }] })}
                />
              </td>
              <td>
                {readOnly ? null : (
                  <button type="button" aria-label={`Remove ${field.name}`} className="text-ink-3 hover:text-error" onClick={() => set(fields.filter((_, i) => i !== index))}>
                    <X size={12} aria-hidden />
                  </button>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {readOnly ? null : (
        <Button size="small" tone="bare" icon={Plus} className="mt-1 -ml-1.5" onClick={add}>
          Value
        </Button>
      )}
    </section>
  );
}

function StructureTable({ space, fields }: { space: AddressSpace; fields: readonly DataTypeField[] }) {
  return (
    <section aria-label="Structure">
      <h3>
        Fields <span className="font-mono font-normal">{fields.length}</span>
      </h3>
      {fields.length === 0 ? (
        <p className="text-small text-ink-3">No fields of its own.</p>
      ) : (
        <table className="small-table" aria-label="Fields">
          <thead>
            <tr>
              <th scope="col">Name</th>
              <th scope="col">DataType</th>
              <th scope="col">Description</th>
            </tr>
          </thead>
          <tbody>
            {fields.map((field) => (
              <tr key={field.name}>
                <td className="px-1.5!">{field.name}</td>
                <td className="px-1.5! font-mono">{field.dataType === undefined ? "" : getNodeName(space, field.dataType)}</td>
                <td className="px-1.5! truncate text-ink-2">{findText(field.description ?? []) ?? ""}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </section>
  );
}
