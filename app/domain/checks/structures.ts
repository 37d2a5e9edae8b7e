/** Structures for rules and examples. */
import { isAbstract, type DataTypeDefinition, type DataTypeNode, type Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { StandardDataType as D, StandardReferenceType as R, StandardType as T } from "../address-space/standard-ids";
import type { CheckContext } from "./check-context";
import type { ExampleModel } from "./example-model";
import { isKindOf, listSupertypes } from "./lookups";

/** A DataType below Structure that may have values; Structure, Union and OptionSet themselves are abstract. */
export function isConcreteStructure(node: Node, ctx: CheckContext): node is DataTypeNode {
  return node.nodeClass === "DataType" && !isAbstract(node) && listSupertypes(ctx, node.key).includes(D.Structure);
}

export function isStructure(ctx: CheckContext, key: NodeKey): boolean {
  return isKindOf(ctx, key, D.Structure);
}

/** For examples: a Structure with its encodings. */
export function addStructure(
  m: ExampleModel,
  name: string,
  fields: DataTypeDefinition["fields"],
  parts: { supertype?: NodeKey; isUnion?: boolean } = {},
): NodeKey {
  const type = m.dataType(name, {
    supertype: parts.supertype ?? D.Structure,
    definition: { fields, ...(parts.isUnion ? { isUnion: true } : {}) },
  });
  for (const encoding of ["Binary", "XML", "JSON"]) {
    m.object(`0:Default ${encoding}`, {
      parent: type,
      reference: R.HasEncoding,
      type: T.DataTypeEncodingType,
      set: {
        symbolicName: `Default${encoding === "Binary" ? "Binary" : encoding === "XML" ? "Xml" : "Json"}`,
        parent: undefined,
      },
    });
  }
  return type;
}
