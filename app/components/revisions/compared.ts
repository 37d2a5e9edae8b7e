import type { ComparisonJson } from "~/utils/api-schemas";

/** A comparison with the two states that it is about. */
export type Compared = ComparisonJson & { readonly from: number | "working"; readonly to: number | "working" };
