/** What rules about event references share. */
import type { Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { StandardType as T } from "../address-space/standard-ids";
import type { CheckContext } from "./check-context";
import { findTypeAbove, isChainLoaded, isKindOf } from "./lookups";

/** Whether the node is an ObjectType below BaseEventType; also true when that cannot be known. */
export function isEventType(ctx: CheckContext, key: NodeKey): boolean {
  const node = ctx.node(key);
  if (!node || !isChainLoaded(ctx, key)) return true;
  return node.nodeClass === "ObjectType" && isKindOf(ctx, key, T.BaseEventType);
}

/** A Method that a type has, as declaration or for itself alone. */
export function isMethodOfType(ctx: CheckContext, node: Node): boolean {
  return node.nodeClass === "Method" && findTypeAbove(ctx, node.key) !== undefined;
}

/** Whether clients can subscribe to events at the node: bit 0 of EventNotifier. */
export function isEventNotifier(node: Node): boolean {
  return (node.nodeClass === "Object" || node.nodeClass === "View") && ((node.eventNotifier ?? 0) & 1) === 1;
}
