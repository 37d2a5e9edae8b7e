/** Packs: a NodeSet that was read once, as JSON. Loading one costs a fraction of reading its XML. */
import { listMappingEntries, type MappingEntry } from "../address-space/mapping-entry";
import type { Layer } from "../address-space/address-space";
import type { ModelHeader } from "../address-space/model-header";
import type { Node } from "../address-space/node";
import { compareRank } from "../address-space/edge-bundle";
import { fail, ok, problem, type Result } from "../core/result";

export const PACK_FORMAT = "ferrule-pack-1";

export type PackContent = {
  readonly header: ModelHeader;
  readonly nodes: readonly Node[];
  readonly mapping?: readonly MappingEntry[];
};

/** A pack without a mapping has no such member, so that packs of before keep their bytes and hashes. */
export function writePack({ header, nodes, mapping }: PackContent): string {
  return JSON.stringify({ format: PACK_FORMAT, header, nodes, ...(mapping && mapping.length > 0 ? { mapping } : {}) });
}

/** What a layer holds, nodes in their order. */
export function toPackContent(layer: Layer): PackContent {
  const nodes = [...layer.nodes.values()].sort(compareRank);
  return { header: layer.header, nodes, mapping: listMappingEntries(layer.mapping) };
}

/** Packs are our own files: only their form is looked at. Problem: `pack.format`. */
export function readPack(text: string): Result<PackContent> {
  const parsed = parseJson(text);
  if (!isPack(parsed)) return fail(problem("pack.format", { expected: PACK_FORMAT }));
  const { header, nodes, mapping } = parsed;
  return ok({ header, nodes, ...(mapping ? { mapping } : {}) });
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}

function isPack(value: unknown): value is PackContent {
  if (typeof value !== "object" || value === null) return false;
  const { format, header, nodes, mapping } = value as Record<string, unknown>;
  return format === PACK_FORMAT && typeof header === "object" && header !== null && Array.isArray(nodes) && (mapping === undefined || Array.isArray(mapping));
}
