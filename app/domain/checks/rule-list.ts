/** The whole catalogue for people and pipelines: rules that run, and those that do not, with the reason. */
import type { Severity } from "../core/result";
import { FILE_RULES } from "./file-rules";
import { RULES } from "./registry";
import { clause } from "./rule";

export type ListedRule = {
  readonly id: string;
  readonly title: string;
  readonly severity: Severity;
  readonly clause: string;
  readonly hasFix: boolean;
  readonly implemented: boolean;
  /** Why a rule does not run; absent for rules that do. */
  readonly reason?: string;
};

type Omission = readonly [id: string, title: string, severity: Severity, clause: string, reason: string];

const BUILT_IN_QUALITY =
  "Nothing can be left unmapped: every row carries invalid process data, special values and outages as StatusCodes.";

const OMITTED: readonly Omission[] = [
  [
    "R047",
    "A ReferenceType subtype keeps the parent's constraints",
    "error",
    clause(3, "§5.3.3.3, §5.7.2"),
    "R026 to R059 ask it: each holds for all subtypes of its reference type.",
  ],
  [
    "R063",
    "HasOrderedComponent only where order matters",
    "hint",
    clause(3, "§7.9"),
    "Withdrawn: the clause adds no constraint.",
  ],
  [
    "R087",
    "Children of an absent optional parent",
    "error",
    clause(3, "§6.4.4.4.1, §6.4.4.4.2"),
    "A part of R086, which asks for members of present parents only.",
  ],
  [
    "R089",
    "Children of a placeholder are not enforced by the containing type",
    "hint",
    clause(3, "§6.4.4.4.4, §6.4.4.4.5"),
    "A part of R086, which asks nothing below placeholders.",
  ],
  [
    "R157",
    "DefaultEncodingId",
    "error",
    clause(3, "§8.48"),
    "An attribute of running servers; a NodeSet has no such field.",
  ],
  [
    "R166",
    "Event types are not inserted inside a published hierarchy",
    "warning",
    "OPC 11030 v1.03 §3.2.9 (white paper)",
    "Needs two versions of a model: the comparison of revisions tells it.",
  ],
  [
    "R179",
    "The declared minimum of a required model suffices",
    "warning",
    "common practice, no source",
    "Needs older versions of the required models than the one that is loaded.",
  ],
  [
    "R189",
    "A reference stored once",
    "hint",
    clause(6, "§F.3, §F.4"),
    "A matter of writing files, never of a model: exports write each reference where loaders look for it.",
  ],
  [
    "R190",
    "Order robust for one-pass loaders",
    "hint",
    "common practice, no source (UANodeSet.xsd allows any order)",
    "A matter of writing files: exports of new models are sorted.",
  ],
  [
    "R195",
    "Extensions preserved",
    "hint",
    "common practice, no source",
    "Behaviour of reading and writing, which tests of these prove.",
  ],
  [
    "R196",
    "Category texts name conformance units",
    "hint",
    `${clause(6, "§F.3")}, ${clause(5, "§3.3")}`,
    "The list of conformance units is not published as data that could be compared.",
  ],
  ["R201", "Quality mapped", "warning", `OPC 30120 §7.1.3, ${clause(8, "§7.3")}`, BUILT_IN_QUALITY],
];

/** In the order of numbers. */
export function listRules(): ListedRule[] {
  const toListed = (rule: Omit<ListedRule, "hasFix" | "implemented">, hasFix: boolean): ListedRule => {
    const { id, title, severity, clause: basis, reason } = rule;
    const implemented = reason === undefined;
    return { id, title, severity, clause: basis, hasFix, implemented, ...(implemented ? {} : { reason }) };
  };
  const listed = [
    ...RULES.map((rule) => toListed(rule, rule.fix !== undefined)),
    ...FILE_RULES.map((rule) => toListed(rule, false)),
    ...OMITTED.map(([id, title, severity, basis, reason]) =>
      toListed({ id, title, severity, clause: basis, reason }, false),
    ),
  ];
  return listed.sort((a, b) => (a.id < b.id ? -1 : 1));
}
