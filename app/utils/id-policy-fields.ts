/** The fields of the form by which a model chooses its NodeIds. */
import { z } from "zod";
import { NODE_CLASSES, PATH_PLACE, PATH_SEPARATORS, type IdPolicy, type IdRange } from "../domain/address-space/id-policy";
import type { NodeClass } from "../domain/address-space/node";

const ends = z.partialRecord(z.enum(NODE_CLASSES), z.coerce.number().int("Write whole numbers").optional()).default({});

export const idPolicyFields = z.object({
  intent: z.literal("set-id-policy"),
  kind: z.enum(["numbers", "ranges", "paths"]),
  pattern: z.string().trim().max(200).default(PATH_PLACE),
  separator: z.enum(PATH_SEPARATORS).default("."),
  from: ends,
  to: ends,
});

/** A class with one end only gets a range that the command then refuses with a reason. */
export function toIdPolicy({ kind, pattern, separator, from, to }: z.infer<typeof idPolicyFields>): IdPolicy {
  if (kind === "numbers") return { kind };
  if (kind === "paths") return { kind, pattern, separator };
  const ranges: Partial<Record<NodeClass, IdRange>> = {};
  for (const nodeClass of NODE_CLASSES) {
    if (from[nodeClass] === undefined && to[nodeClass] === undefined) continue;
    ranges[nodeClass] = { from: from[nodeClass] ?? 0, to: to[nodeClass] ?? 0 };
  }
  return { kind, ranges };
}
