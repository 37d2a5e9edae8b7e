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
import { r025 } from "./rules/r025-reference-once";
import { r026 } from "./rules/r026-no-self-reference";
import { r027 } from "./rules/r027-no-child-loops";
import { r028 } from "./rules/r028-no-event-loops";
import { r029 } from "./rules/r029-component-target";
import { r030 } from "./rules/r030-component-source-of-variables";
import { r031 } from "./rules/r031-component-source-of-objects";
import { r032 } from "./rules/r032-property-target";
import { r033 } from "./rules/r033-property-leaf";
import { r034 } from "./rules/r034-property-or-data-variable";
import { r035 } from "./rules/r035-property-type";
import { r036 } from "./rules/r036-data-variable-type";
import { r037 } from "./rules/r037-variable-parent";
import { r038 } from "./rules/r038-method-parent";
import { r039 } from "./rules/r039-reachable";
import { r040 } from "./rules/r040-organizes-source";
import { r041 } from "./rules/r041-subtype-ends";
import { r042 } from "./rules/r042-one-supertype";
import { r043 } from "./rules/r043-reference-type-references";
import { r044 } from "./rules/r044-data-type-references";
import { r045 } from "./rules/r045-view-references";
import { r046 } from "./rules/r046-inverse-name";
import { r048 } from "./rules/r048-reference-type-branch";
import { r049 } from "./rules/r049-type-definition";
import { r050 } from "./rules/r050-modelling-rule";
import { r051 } from "./rules/r051-encoding-ends";
import { r052 } from "./rules/r052-generates-event-source";
import { r053 } from "./rules/r053-always-generates-event";
import { r054 } from "./rules/r054-event-source-source";
import { r055 } from "./rules/r055-notifier-target";
import { r056 } from "./rules/r056-condition-ends";
import { r057 } from "./rules/r057-event-hierarchy-root";
import { r058 } from "./rules/r058-interface-ends";
import { r059 } from "./rules/r059-add-in-ends";
import { r060 } from "./rules/r060-argument-descriptions";
import { r061 } from "./rules/r061-optional-arguments-last";
import { r062 } from "./rules/r062-structured-component";
import { r064 } from "./rules/r064-associated-with";
import { r065 } from "./rules/r065-deprecated-target";
import { r066 } from "./rules/r066-abstract-type-instance";
import { r067 } from "./rules/r067-interface-as-type";
import { r068 } from "./rules/r068-interface-definition";
import { r069 } from "./rules/r069-interface-members";
import { r070 } from "./rules/r070-interface-optional-path";
import { r071 } from "./rules/r071-interfaces-collide";
import { r072 } from "./rules/r072-interface-twice";
import { r073 } from "./rules/r073-add-in-name";
import { r074 } from "./rules/r074-declaration-of-one-type";
import { r075 } from "./rules/r075-type-child-without-rule";
import { r076 } from "./rules/r076-rule-on-instance";
import { r077 } from "./rules/r077-placeholder-brackets";
import { r078 } from "./rules/r078-brackets-without-placeholder";
import { r079 } from "./rules/r079-placeholder-method";
import { r080 } from "./rules/r080-rule-only-tightened";
import { r081 } from "./rules/r081-exposes-its-array";
import { r082 } from "./rules/r082-override-similar";
import { r083 } from "./rules/r083-override-path";
import { r084 } from "./rules/r084-needless-override";
import { r085 } from "./rules/r085-attributes-kept";
import { r086 } from "./rules/r086-mandatory-members";
import { r088 } from "./rules/r088-mandatory-placeholder";
import { r090 } from "./rules/r090-member-similar";
import { r091 } from "./rules/r091-references-join-same-nodes";
import { r092 } from "./rules/r092-method-copy-linked";
import { r093 } from "./rules/r093-state-machine-type";
import { r094 } from "./rules/r094-state-machine-instance";
import { r095 } from "./rules/r095-data-type";
import { r096 } from "./rules/r096-base-data-type";
import { r097 } from "./rules/r097-data-type-narrows";
import { r098 } from "./rules/r098-value-rank-narrows";
import { r099 } from "./rules/r099-array-dimensions";
import { r100 } from "./rules/r100-array-dimensions-refined";
import { r101 } from "./rules/r101-value-matches-rank";
import { r102 } from "./rules/r102-value-length";
import { r103 } from "./rules/r103-value-matches-data-type";
import { r104 } from "./rules/r104-value-in-enumeration";
import { r105 } from "./rules/r105-structure-fields";
import { r106 } from "./rules/r106-value-of-abstract-type";
import { r107 } from "./rules/r107-access-level-bits";
import { r108 } from "./rules/r108-user-access-level";
import { r109 } from "./rules/r109-setpoint-access";
import { r110 } from "./rules/r110-measured-and-writable";
import { r111 } from "./rules/r111-semantic-change";
import { r112 } from "./rules/r112-historizing";
import { r113 } from "./rules/r113-sampling-interval";
import { r114 } from "./rules/r114-event-notifier-bits";
import { r115 } from "./rules/r115-mask-bits";
import { r116 } from "./rules/r116-length-properties";
import { r117 } from "./rules/r117-fixed-size-array";
import { r118 } from "./rules/r118-properties-of-properties";
import { r119 } from "./rules/r119-analog-item-range";
import { r120 } from "./rules/r120-analog-unit";
import { r121 } from "./rules/r121-analog-numeric";
import { r122 } from "./rules/r122-number-without-unit";
import { r123 } from "./rules/r123-units-on-numbers";
import { r124 } from "./rules/r124-unit-has-value";
import { r125 } from "./rules/r125-unit-namespace";
import { r126 } from "./rules/r126-unit-id";
import { r127 } from "./rules/r127-unit-texts";
import { r128 } from "./rules/r128-range-order";
import { r129 } from "./rules/r129-ranges-nested";
import { r130 } from "./rules/r130-instrument-range-fits";
import { r131 } from "./rules/r131-two-state-discrete";
import { r132 } from "./rules/r132-multi-state-discrete";
import { r133 } from "./rules/r133-multi-state-value-discrete";
import { r134 } from "./rules/r134-discrete-item-concrete";
import { r135 } from "./rules/r135-array-items";
import { r136 } from "./rules/r136-value-precision";
import { r137 } from "./rules/r137-no-own-base-data-type";
import { r138 } from "./rules/r138-xml-element-leaf";
import { r139 } from "./rules/r139-enum-strings-or-values";
import { r140 } from "./rules/r140-enum-strings-zero-based";
import { r141 } from "./rules/r141-enum-property-agrees";
import { r142 } from "./rules/r142-enum-values-unique";
import { r143 } from "./rules/r143-enum-subtype-restricts";
import { r144 } from "./rules/r144-definition-present";
import { r145 } from "./rules/r145-field-data-type";
import { r146 } from "./rules/r146-field-rank";
import { r147 } from "./rules/r147-field-names-unique";
import { r148 } from "./rules/r148-field-flags";
import { r149 } from "./rules/r149-max-string-length";
import { r150 } from "./rules/r150-union-parent";
import { r151 } from "./rules/r151-recursive-structure";
import { r152 } from "./rules/r152-encodings-present";
import { r153 } from "./rules/r153-encodings-of-concrete";
import { r154 } from "./rules/r154-option-set-values";
import { r155 } from "./rules/r155-option-set-subtype";
import { r156 } from "./rules/r156-bit-numbers";
import { r158 } from "./rules/r158-argument-properties";
import { r159 } from "./rules/r159-argument-names";
import { r160 } from "./rules/r160-argument-type-and-rank";
import { r161 } from "./rules/r161-no-aliases-in-values";
import { r162 } from "./rules/r162-method-override-signature";
import { r163 } from "./rules/r163-empty-argument-list";
import { r164 } from "./rules/r164-user-executable";
import { r165 } from "./rules/r165-event-type-target";
import { r167 } from "./rules/r167-condition-source";
import { r168 } from "./rules/r168-alarm-below-variable";
import { r169 } from "./rules/r169-model-uri-listed";
import { r170 } from "./rules/r170-used-namespaces-required";
import { r171 } from "./rules/r171-base-model-required";
import { r172 } from "./rules/r172-known-namespaces";
import { r173 } from "./rules/r173-unused-namespace";
import { r174 } from "./rules/r174-model-version";
import { r175 } from "./rules/r175-publication-date";
import { r176 } from "./rules/r176-required-model-satisfied";
import { r177 } from "./rules/r177-required-model-content";
import { r178 } from "./rules/r178-no-circular-dependency";
import { r180 } from "./rules/r180-xml-schema-uri";
import { r181 } from "./rules/r181-namespace-metadata";
import { r182 } from "./rules/r182-metadata-arrays";
import { r183 } from "./rules/r183-parent-node-id";
import { r184 } from "./rules/r184-design-tool-only";
import { r185 } from "./rules/r185-release-status";
import { r186 } from "./rules/r186-purpose";
import { r187 } from "./rules/r187-method-declaration";
import { r188 } from "./rules/r188-aliases";
import { r192 } from "./rules/r192-value-namespace";
import { r193 } from "./rules/r193-value-namespace-index";
import { r194 } from "./rules/r194-translation-count";
import { r197 } from "./rules/r197-role-permissions";
import { r198 } from "./rules/r198-row-feeds-member";
import { r199 } from "./rules/r199-source-fits-data-type";
import { r200 } from "./rules/r200-mapped-units-agree";
import { r202 } from "./rules/r202-output-within-range";
import { r203 } from "./rules/r203-one-scaling";
import { r204 } from "./rules/r204-mandatory-mapped";
import { r311 } from "./rules/r311-five-groups";
import { r312 } from "./rules/r312-like-its-type";
import { r401 } from "./rules/r401-mapping-runs";
import { r402 } from "./rules/r402-check-cases-hold";
import { r403 } from "./rules/r403-mapped-ranges-fit";
import { r404 } from "./rules/r404-scaled-once";
import { r405 } from "./rules/r405-port-once";
import { r406 } from "./rules/r406-port-class";
import { r407 } from "./rules/r407-planned-device";
import { r408 } from "./rules/r408-process-data-length";
import { r409 } from "./rules/r409-roles-bound";

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
  r025,
  r026,
  r027,
  r028,
  r029,
  r030,
  r031,
  r032,
  r033,
  r034,
  r035,
  r036,
  r037,
  r038,
  r039,
  r040,
  r041,
  r042,
  r043,
  r044,
  r045,
  r046,
  r048,
  r049,
  r050,
  r051,
  r052,
  r053,
  r054,
  r055,
  r056,
  r057,
  r058,
  r059,
  r060,
  r061,
  r062,
  r064,
  r065,
  r066,
  r067,
  r068,
  r069,
  r070,
  r071,
  r072,
  r073,
  r074,
  r075,
  r076,
  r077,
  r078,
  r079,
  r080,
  r081,
  r082,
  r083,
  r084,
  r085,
  r086,
  r088,
  r090,
  r091,
  r092,
  r093,
  r094,
  r095,
  r096,
  r097,
  r098,
  r099,
  r100,
  r101,
  r102,
  r103,
  r104,
  r105,
  r106,
  r107,
  r108,
  r109,
  r110,
  r111,
  r112,
  r113,
  r114,
  r115,
  r116,
  r117,
  r118,
  r119,
  r120,
  r121,
  r122,
  r123,
  r124,
  r125,
  r126,
  r127,
  r128,
  r129,
  r130,
  r131,
  r132,
  r133,
  r134,
  r135,
  r136,
  r137,
  r138,
  r139,
  r140,
  r141,
  r142,
  r143,
  r144,
  r145,
  r146,
  r147,
  r148,
  r149,
  r150,
  r151,
  r152,
  r153,
  r154,
  r155,
  r156,
  r158,
  r159,
  r160,
  r161,
  r162,
  r163,
  r164,
  r165,
  r167,
  r168,
  r169,
  r170,
  r171,
  r172,
  r173,
  r174,
  r175,
  r176,
  r177,
  r178,
  r180,
  r181,
  r182,
  r183,
  r184,
  r185,
  r186,
  r187,
  r188,
  r192,
  r193,
  r194,
  r197,
  r198,
  r199,
  r200,
  r202,
  r203,
  r204,
  r311,
  r312,
  r401,
  r402,
  r403,
  r404,
  r405,
  r406,
  r407,
  r408,
  r409,
];

const byId = new Map<string, Rule>(RULES.map((rule) => [rule.id, rule] as const));

export function findRule(id: string): Rule | undefined {
  return byId.get(id);
}
