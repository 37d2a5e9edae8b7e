/**
 * How a model chooses the NodeIds of its new nodes: numbers one after the other, numbers from a range of its own for each
 * node class, or for the nodes of machines the path of their names (`B1.Gearbox.Vibration`). The choice is a field of the
 * model's header, so that every window, command and server process asks the same one; a NodeSet2 file has no place for it.
 */
import type { NodeClass } from "./node";
import { problem, type Problem } from "../core/result";

export type IdRange = { readonly from: number; readonly to: number };

export type IdPolicy =
  | { readonly kind: "numbers" }
  /** Classes without a range take numbers one after the other. */
  | { readonly kind: "ranges"; readonly ranges: Readonly<Partial<Record<NodeClass, IdRange>>> }
  /**
   * String identifiers for nodes outside of types. `{path}` in the pattern stands for the name of a node whose owner has no
   * such identifier; nodes below continue it with the separator: `Hall2.{path}`.
   */
  | { readonly kind: "paths"; readonly pattern: string; readonly separator: PathSeparator };

export const PATH_SEPARATORS = [".", "/", "_"] as const;
export type PathSeparator = (typeof PATH_SEPARATORS)[number];

export const NUMBERS: IdPolicy = { kind: "numbers" };
export const PATH_PLACE = "{path}";
/** Numbers above are left to ids that people or other programs chose. */
export const HIGHEST_ALLOCATED = 0x7fffffff;

export const NODE_CLASSES: readonly NodeClass[] = [
  "ObjectType",
  "VariableType",
  "DataType",
  "ReferenceType",
  "Object",
  "Variable",
  "Method",
  "View",
];

/**
 * How many ids of a class a window keeps in stock, since an edit cannot wait for the network: enough for a large type, and a
 * twentieth of the range at most, since what a window does not use is lost.
 */
export function getStockSize({ from, to }: IdRange): number {
  return Math.max(8, Math.min(400, Math.ceil((to - from + 1) / 20)));
}

/** What keeps a policy from being used. Problems: `id-policy.pattern`, `id-policy.range`, `id-policy.overlap`. */
export function checkIdPolicy(policy: IdPolicy): Problem[] {
  if (policy.kind === "paths") {
    const isUsable = policy.pattern.split(PATH_PLACE).length === 2;
    return isUsable ? [] : [problem("id-policy.pattern", { pattern: policy.pattern })];
  }
  if (policy.kind === "numbers") return [];
  const ranges = NODE_CLASSES.flatMap((nodeClass) => {
    const range = policy.ranges[nodeClass];
    return range ? [{ nodeClass, ...range }] : [];
  });
  const wrong = ranges.filter(({ from, to }) => !(from >= 1 && from <= to && to <= HIGHEST_ALLOCATED));
  const problems = wrong.map(({ nodeClass, from, to }) =>
    problem("id-policy.range", { nodeClass, from, to, limit: HIGHEST_ALLOCATED }),
  );
  const sorted = [...ranges].sort((a, b) => a.from - b.from);
  sorted.forEach((range, i) => {
    const before = sorted[i - 1];
    if (before && before.to >= range.from)
      problems.push(problem("id-policy.overlap", { first: before.nodeClass, second: range.nodeClass }));
  });
  return problems;
}
