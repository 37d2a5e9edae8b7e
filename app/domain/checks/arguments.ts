/** Method arguments as values hold them (OPC 10000-3 §8.6). */
import { parseNodeId, type NodeKey } from "../address-space/node-id";
import type { CheckContext } from "./check-context";
import { findStandardProperty } from "./lookups";
import type { ValueElement } from "./value-element";
import { findChild } from "./value-element";
import { listBodies, textOf } from "./value-xml";

export type ArgumentValue = {
  readonly name: string;
  /** NodeId text as written. */
  readonly dataType: string;
  /** Undefined where the element is left out. */
  readonly valueRank: number | undefined;
  readonly dimensions: readonly string[];
};

export function readArguments(
  ctx: CheckContext,
  method: NodeKey,
  property: "InputArguments" | "OutputArguments",
): ArgumentValue[] {
  const node = findStandardProperty(ctx, method, property);
  return node?.nodeClass === "Variable" ? listBodies(node.value, "Argument").map(toArgument) : [];
}

function toArgument(body: ValueElement): ArgumentValue {
  const rank = textOf(body, "ValueRank");
  return {
    name: textOf(body, "Name"),
    dataType: textOf(body, "DataType", "Identifier"),
    valueRank: rank === "" ? undefined : Number(rank),
    dimensions: (findChild(body, "ArrayDimensions")?.children ?? []).map((d) => d.text.trim()),
  };
}

/** The key of the node behind a NodeId text of a value; undefined when it is not loaded or no NodeId. */
export function toKey(ctx: CheckContext, text: string): NodeKey | undefined {
  const parsed = parseNodeId(text, []);
  return parsed.ok ? ctx.findWithNodeId(parsed.value) : undefined;
}
