/** What rules about Data Access items share: the Properties that an instance must have. */
import { getDataType } from "../address-space/node";
import type { Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import type { CheckContext } from "./check-context";
import type { ReportFunction } from "./finding";
import { findStandardProperty, findTypeAbove, findTypeDefinition, isChainLoaded, isKindOf } from "./lookups";

export type WantedProperty = { readonly name: string; readonly dataType: NodeKey };

/** The type definition where it is the wanted VariableType or below it. */
export function findItemType(node: Node, ctx: CheckContext, wanted: NodeKey): NodeKey | undefined {
  const type = node.nodeClass === "Variable" ? findTypeDefinition(ctx, node.key) : undefined;
  return type !== undefined && isKindOf(ctx, type, wanted) ? type : undefined;
}

/** Reports Properties that are missing on an instance (declarations may leave them to their type), or of another DataType. */
export function checkProperties(
  node: Node,
  type: NodeKey,
  wanted: readonly WantedProperty[],
  ctx: CheckContext,
  report: ReportFunction,
): void {
  const isDeclared = findTypeAbove(ctx, node.key) !== undefined;
  for (const { name, dataType } of wanted) {
    const property = findStandardProperty(ctx, node.key, name);
    if (!property) {
      if (isDeclared) continue;
      report({
        message: `${node.browseName.name} is of ${ctx.nameOf(type)} and has no ${name}.`,
        facts: [`HasTypeDefinition: ${ctx.describe(type)}`, `Properties named ${name} in namespace 0: 0`],
        data: { property: name },
      });
    } else if (
      property.nodeClass === "Variable" &&
      isChainLoaded(ctx, getDataType(property)) &&
      !isKindOf(ctx, getDataType(property), dataType)
    ) {
      report({
        attribute: "dataType",
        message: `${name} of ${node.browseName.name} has the DataType ${ctx.nameOf(getDataType(property))} instead of ${ctx.nameOf(dataType)}.`,
        facts: [`Property: ${ctx.describe(property.key)}`, `DataType: ${ctx.describe(getDataType(property))}`],
      });
    }
  }
}
