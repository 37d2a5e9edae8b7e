/** Fields and bits as people write them down, one a line: `Speed Double`, `Names: String[]`, `Label? String`, `4 Worn`. Pure. */
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import type { OptionSetBit, StructureFieldIntent } from "~/domain/editing/commands/add-structure";

export type ParsedLines<T> = { readonly items: readonly T[]; readonly reasons: readonly string[] };

const FIELD = /^(.+?)(\?)?(?:\s*[:\t]\s*|\s+)([^\s[\]:?]+)\s*((?:\[[\d,\s]*\])?)$/;

/** `findType` answers the DataType of a name. A line without a type is a String, as far as one can tell. */
export function parseFieldLines(
  text: string,
  findType: (name: string) => NodeKey | undefined,
): ParsedLines<StructureFieldIntent> {
  const items: StructureFieldIntent[] = [];
  const reasons: string[] = [];
  for (const line of listLines(text)) {
    const match = FIELD.exec(line);
    const type = match?.[3] === undefined ? StandardDataType.String : findType(match[3]);
    const name = (match?.[1] ?? line.replace(/\?$/, "")).trim();
    if (type === undefined) {
      reasons.push(`${name}: no DataType is called “${match?.[3] ?? ""}”.`);
      continue;
    }
    const rank = readRank(match?.[4] ?? "");
    items.push({
      name,
      dataType: type,
      ...rank,
      ...(match?.[2] === "?" || (!match && line.endsWith("?")) ? { isOptional: true } : {}),
    });
  }
  return { items, reasons };
}

/** `[]` one dimension, `[,]` two, `[3]` one of three at most (OPC 10000-3 §8.51). */
function readRank(brackets: string): Partial<StructureFieldIntent> {
  if (brackets === "") return {};
  const sizes = brackets
    .slice(1, -1)
    .split(",")
    .map((size) => Number(size.trim() || 0));
  return { valueRank: sizes.length, arrayDimensions: sizes };
}

/** Lines without a number take the next bit. */
export function parseBitLines(text: string): ParsedLines<OptionSetBit> {
  let next = 0;
  const items = listLines(text).map((line) => {
    const match = /^(\d{1,4})\s*[=:;,.)\t ]\s*(.+)$/.exec(line);
    const bit = match ? Number(match[1]) : next;
    next = bit + 1;
    return { name: (match?.[2] ?? line).trim(), bit };
  });
  return { items, reasons: [] };
}

function listLines(text: string): string[] {
  return text
    .split(/\r?\n/)
    .map((line) => line.trim())
    .filter((line) => line !== "");
}
