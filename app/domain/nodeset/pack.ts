/** Packs: a NodeSet that was read once, as JSON. Loading one costs a fraction of reading its XML. */
import type { ModelHeader } from "../address-space/model-header";
import type { Node } from "../address-space/node";
import { fail, ok, problem, type Result } from "../core/result";

export const PACK_FORMAT = "ferrule-pack-1";

export type PackContent = { readonly header: ModelHeader; readonly nodes: readonly Node[] };

export function writePack(content: PackContent): string {
  return JSON.stringify({ format: PACK_FORMAT, header: content.header, nodes: content.nodes });
}

/** Packs are our own files: only their form is looked at. Problem: `pack.format`. */
export function readPack(text: string): Result<PackContent> {
  const parsed = parseJson(text);
  if (!isPack(parsed)) return fail(problem("pack.format", { expected: PACK_FORMAT }));
  return ok({ header: parsed.header, nodes: parsed.nodes });
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
  const { format, header, nodes } = value as Record<string, unknown>;
  return format === PACK_FORMAT && typeof header === "object" && header !== null && Array.isArray(nodes);
}
