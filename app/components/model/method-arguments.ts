/** Arguments of a Method as rows (OPC 10000-3 §8.6). */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import { findArguments } from "~/domain/nodeset/values/standard-values";
import { readPropertyValue } from "./read-typed-value";

export type Direction = "input" | "output";
export type ArgumentFacts = { readonly name: string; readonly dataType: NodeKey; readonly valueRank: number; readonly description: string };

const PROPERTIES: Readonly<Record<Direction, string>> = { input: "InputArguments", output: "OutputArguments" };

export function listArguments(space: AddressSpace, method: NodeKey, direction: Direction): ArgumentFacts[] {
  const list = findArguments(readPropertyValue(space, method, PROPERTIES[direction])) ?? [];
  return list.map((argument) => ({
    name: argument.name,
    dataType: space.findByNodeId(argument.dataType)?.key ?? toNodeKey(argument.dataType),
    valueRank: argument.valueRank,
    description: argument.description?.text ?? "",
  }));
}
