import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Node, RolePermission } from "~/domain/address-space/node";
import { standardKey, type NodeKey } from "~/domain/address-space/node-id";
import { StandardReferenceType } from "~/domain/address-space/standard-ids";
import { getNodeName } from "../model/member-facts";
import { Checkbox, Select } from "../ui/field";
import { findOptionBits, hasBit, withBit } from "../values/option-bits";
import { BIT_TYPES, useSetOne } from "./attributes-column";
import { BitField } from "./bit-field";
import { Fact } from "./particular";
import { SmallTable } from "./small-table";

type Props = { space: AddressSpace; node: Node; readOnly: boolean };

const ROLE_TYPE = standardKey(15620);

/** Who may do what with the node (OPC 10000-3 §5.2.9–5.2.11, §8.55, §8.56). */
export function PermissionsColumn({ space, node, readOnly }: Props) {
  const set = useSetOne(node);
  const list = node.rolePermissions ?? [];
  const roles = listRoles(space, list);
  const bits = findOptionBits(space, BIT_TYPES.permissions) ?? [];
  const write = (next: readonly RolePermission[]): void => set("rolePermissions", next.length === 0 ? undefined : next);
  const change = (index: number, part: Partial<RolePermission>): void =>
    write(list.map((entry, i) => (i === index ? { ...entry, ...part } : entry)));
  const free = roles.find((role) => !list.some((entry) => entry.role === role));
  return (
    <section aria-label="Permissions">
      <SmallTable
        title="Role permissions"
        columns={[{ title: "Role", width: "42%" }, { title: "May" }]}
        rows={list}
        readOnly={readOnly}
        nameOf={(entry) => getNodeName(space, entry.role)}
        none={node.hasNoPermissions ? "None, and that is written." : "As the namespace or the server says."}
        addLabel="Role"
        {...(free === undefined ? {} : { onAdd: () => write([...list, { role: free, permissions: READABLE }]) })}
        onRemove={(index) => write(list.filter((_, i) => i !== index))}
        cells={(entry, index) => [
          <Select
            key="role"
            size="small"
            aria-label={`Role ${index + 1}`}
            value={entry.role}
            disabled={readOnly}
            onChange={(event) => change(index, { role: event.currentTarget.value as NodeKey })}
          >
            {roles.map((role) => (
              <option key={role} value={role}>
                {getNodeName(space, role)}
              </option>
            ))}
          </Select>,
          <details key="may" className="bit-field">
            <summary aria-label={`Permissions of ${getNodeName(space, entry.role)}`}>
              {describe(entry.permissions, bits)}
            </summary>
            <div className="grid gap-0.5 py-1">
              {bits.map(({ bit, name, description }) => (
                <Checkbox
                  key={bit}
                  label={name}
                  title={description}
                  checked={hasBit(entry.permissions, bit)}
                  disabled={readOnly}
                  onChange={(event) =>
                    change(index, { permissions: withBit(entry.permissions, bit, event.currentTarget.checked) })
                  }
                />
              ))}
            </div>
          </details>,
        ]}
      />
      <div className="h-2" />
      <Fact label="">
        <Checkbox
          label="no permissions for anybody"
          checked={node.hasNoPermissions === true}
          disabled={readOnly || list.length > 0}
          onChange={(event) => set("hasNoPermissions", event.currentTarget.checked ? true : undefined)}
        />
      </Fact>
      <BitField
        label="Restrictions"
        space={space}
        dataType={BIT_TYPES.accessRestrictions}
        value={node.accessRestrictions}
        readOnly={readOnly}
        onChange={(value) => set("accessRestrictions", value)}
      />
      <BitField
        label="Write mask"
        space={space}
        dataType={BIT_TYPES.writeMask}
        value={node.writeMask}
        readOnly={readOnly}
        onChange={(value) => set("writeMask", value)}
      />
      <BitField
        label="User mask"
        space={space}
        dataType={BIT_TYPES.writeMask}
        value={node.userWriteMask}
        readOnly={readOnly}
        onChange={(value) => set("userWriteMask", value)}
      />
    </section>
  );
}

/** Browse and Read (OPC 10000-3 Table 38): what a new row begins with. */
const READABLE = 0b100001;

function describe(value: number, bits: readonly { bit: number; name: string }[]): string {
  const names = bits.filter(({ bit }) => hasBit(value, bit)).map(({ name }) => name);
  if (names.length === 0) return "nothing";
  return names.length > 3 ? `${names.slice(0, 2).join(", ")} and ${names.length - 2} more` : names.join(", ");
}

/** The roles of the loaded models: Objects of type RoleType, and those that the node names already. */
function listRoles(space: AddressSpace, list: readonly RolePermission[]): NodeKey[] {
  const typed = space
    .edgesTo(ROLE_TYPE)
    .flatMap((edge) => (edge.type === StandardReferenceType.HasTypeDefinition ? [edge.source] : []));
  const named = typed.filter((key) => !(space.getNode(key)?.browseName.name ?? "<").startsWith("<"));
  return [...new Set([...named, ...list.map((entry) => entry.role)])];
}
