/** All rules, in the order of their numbers. */
import type { Rule } from "./rule";
import { r001 } from "./rules/r001-node-id-not-null";
import { r002 } from "./rules/r002-node-id-unique";
import { r003 } from "./rules/r003-string-identifier-limits";
import { r004 } from "./rules/r004-node-id-own-namespace";
import { r005 } from "./rules/r005-numeric-type-ids";
import { r006 } from "./rules/r006-browse-name-form";
import { r007 } from "./rules/r007-index-like-name";
import { r008 } from "./rules/r008-type-names-unique";
import { r009 } from "./rules/r009-sibling-browse-names";
import { r010 } from "./rules/r010-instance-sibling-names";
import { r011 } from "./rules/r011-property-names-unique";
import { r012 } from "./rules/r012-standard-member-namespace";
import { r013 } from "./rules/r013-type-naming";
import { r014 } from "./rules/r014-name-characters";
import { r015 } from "./rules/r015-names-differ-in-case";
import { r016 } from "./rules/r016-display-name";
import { r017 } from "./rules/r017-one-text-per-locale";
import { r018 } from "./rules/r018-locale-form";
import { r019 } from "./rules/r019-description";
import { r020 } from "./rules/r020-namespace-uri-form";
import { r021 } from "./rules/r021-uris-nearly-equal";
import { r022 } from "./rules/r022-symbolic-name";
import { r023 } from "./rules/r023-reference-target";
import { r024 } from "./rules/r024-reference-type";
import { r027 } from "./rules/r027-no-child-loops";
import { r029 } from "./rules/r029-component-target";
import { r030 } from "./rules/r030-component-source-of-variables";
import { r031 } from "./rules/r031-component-source-of-objects";
import { r032 } from "./rules/r032-property-target";
import { r033 } from "./rules/r033-property-leaf";
import { r035 } from "./rules/r035-property-type";
import { r036 } from "./rules/r036-data-variable-type";
import { r041 } from "./rules/r041-subtype-ends";
import { r042 } from "./rules/r042-one-supertype";
import { r049 } from "./rules/r049-type-definition";
import { r050 } from "./rules/r050-modelling-rule";
import { r066 } from "./rules/r066-abstract-type-instance";
import { r069 } from "./rules/r069-interface-members";
import { r075 } from "./rules/r075-type-child-without-rule";
import { r080 } from "./rules/r080-rule-only-tightened";
import { r086 } from "./rules/r086-mandatory-members";
import { r090 } from "./rules/r090-member-similar";
import { r095 } from "./rules/r095-data-type";
import { r097 } from "./rules/r097-data-type-narrows";
import { r098 } from "./rules/r098-value-rank-narrows";
import { r099 } from "./rules/r099-array-dimensions";
import { r101 } from "./rules/r101-value-matches-rank";
import { r103 } from "./rules/r103-value-matches-data-type";
import { r119 } from "./rules/r119-analog-item-range";
import { r120 } from "./rules/r120-analog-unit";
import { r123 } from "./rules/r123-units-on-numbers";
import { r125 } from "./rules/r125-unit-namespace";
import { r126 } from "./rules/r126-unit-id";
import { r181 } from "./rules/r181-namespace-metadata";

export const RULES: readonly Rule[] = [
  r001,
  r002,
  r003,
  r004,
  r005,
  r006,
  r007,
  r008,
  r009,
  r010,
  r011,
  r012,
  r013,
  r014,
  r015,
  r016,
  r017,
  r018,
  r019,
  r020,
  r021,
  r022,
  r023,
  r024,
  r027,
  r029,
  r030,
  r031,
  r032,
  r033,
  r035,
  r036,
  r041,
  r042,
  r049,
  r050,
  r066,
  r069,
  r075,
  r080,
  r086,
  r090,
  r095,
  r097,
  r098,
  r099,
  r101,
  r103,
  r119,
  r120,
  r123,
  r125,
  r126,
  r181,
];

const byId = new Map<string, Rule>(RULES.map((rule) => [rule.id, rule] as const));

export function findRule(id: string): Rule | undefined {
  return byId.get(id);
}
