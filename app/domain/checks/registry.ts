/** All rules, in the order of their numbers. */
import type { Rule } from "./rule";
import { r001 } from "./rules/r001-node-id-not-null";
import { r002 } from "./rules/r002-node-id-unique";
import { r004 } from "./rules/r004-node-id-own-namespace";
import { r006 } from "./rules/r006-browse-name-form";
import { r008 } from "./rules/r008-type-names-unique";
import { r009 } from "./rules/r009-sibling-browse-names";
import { r012 } from "./rules/r012-standard-member-namespace";
import { r016 } from "./rules/r016-display-name";
import { r023 } from "./rules/r023-reference-target";
import { r024 } from "./rules/r024-reference-type";

export const RULES: readonly Rule[] = [r001, r002, r004, r006, r008, r009, r012, r016, r023, r024];

const byId = new Map(RULES.map((rule) => [rule.id, rule] as const));

export function findRule(id: string): Rule | undefined {
  return byId.get(id as Rule["id"]);
}
