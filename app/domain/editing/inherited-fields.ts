/** Rules between the fields of a DataType and those of its supertypes. */
import type { AddressSpace } from "../address-space/address-space";
import type { DataTypeField } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { StandardDataType } from "../address-space/standard-ids";
import { isSubtypeOf, listSupertypes } from "../address-space/type-hierarchy";
import { problem, type Problem } from "../core/result";

type Field = Pick<DataTypeField, "name" | "value">;

/**
 * A structure repeats no inherited field name (OPC 10000-3 §8.48), an enumeration adds no value to the one that it derives
 * from (§8.14). Problems: `structure.name-inherited`, `enumeration.extends`.
 */
export function checkInheritedFields(
  space: AddressSpace,
  supertype: NodeKey,
  fields: readonly Field[],
): Problem | undefined {
  if (isSubtypeOf(space, supertype, StandardDataType.Enumeration)) return checkValues(space, supertype, fields);
  if (!isSubtypeOf(space, supertype, StandardDataType.Structure)) return undefined;
  const inherited = new Set(
    [supertype, ...listSupertypes(space, supertype)].flatMap((key) => listFields(space, key).map((f) => f.name)),
  );
  const repeated = fields.find((field) => inherited.has(field.name));
  return repeated && problem("structure.name-inherited", { name: repeated.name });
}

function checkValues(space: AddressSpace, supertype: NodeKey, fields: readonly Field[]): Problem | undefined {
  const base = listFields(space, supertype);
  const isAbstract = base.length === 0;
  const added = fields.find((field) => !base.some((b) => b.value === field.value && b.name === field.name));
  return isAbstract || !added
    ? undefined
    : problem("enumeration.extends", { name: added.name, value: added.value ?? -1 });
}

function listFields(space: AddressSpace, key: NodeKey): readonly DataTypeField[] {
  const node = space.getNode(key);
  const definition = node?.nodeClass === "DataType" ? node.definition : undefined;
  return definition?.isOptionSet ? [] : (definition?.fields ?? []);
}
