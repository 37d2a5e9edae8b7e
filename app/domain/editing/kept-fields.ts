/** Fields of a Definition that is edited keep what the edit does not speak of. */
import type { DataTypeField, DataTypeNode } from "../address-space/node";

/** What no command sets (symbolic and display names, what no schema knows) stays with the field of the same or former name. */
export function keepUnnamed(
  node: DataTypeNode,
  intent: { readonly name: string; readonly was?: string },
  field: DataTypeField,
): DataTypeField {
  const old = node.definition?.fields.find((f) => f.name === (intent.was ?? intent.name));
  if (!old) return field;
  const { symbolicName, displayName, otherAttributes, otherElements } = old;
  const isRenamed = intent.was !== undefined && intent.was !== intent.name;
  return {
    ...(symbolicName === undefined || isRenamed ? {} : { symbolicName }),
    ...(displayName === undefined || isRenamed ? {} : { displayName }),
    ...(otherAttributes ? { otherAttributes } : {}),
    ...(otherElements ? { otherElements } : {}),
    ...field,
  };
}
