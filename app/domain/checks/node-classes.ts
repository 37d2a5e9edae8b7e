/** Lists of NodeClasses. */
import type { NodeClass } from "../address-space/node";

export const ALL_CLASSES: readonly NodeClass[] = [
  "Object",
  "Variable",
  "Method",
  "View",
  "ObjectType",
  "VariableType",
  "DataType",
  "ReferenceType",
];

export const TYPE_CLASSES: readonly NodeClass[] = ["ObjectType", "VariableType", "DataType", "ReferenceType"];
