import type { Difference } from "~/components/notation/difference-badge";

/** The shape that stands beside a change. */
export function toDifference({ kind }: { readonly kind: string }): Difference {
  if (kind.endsWith("-added")) return "added";
  return kind.endsWith("-removed") ? "removed" : "changed";
}
