/**
 * Problems of reading that break a rule of the catalogue. The graph cannot show them any more: of two nodes with one
 * NodeId only one is left, an alias is resolved or gone. So the reader's word is taken.
 */
import type { Problem } from "../core/result";
import { formatProblem } from "../core/problem-texts";
import type { Finding, RuleId } from "./finding";
import { findRule } from "./registry";

const RULE_BY_CODE: Readonly<Record<string, RuleId>> = {
  "nodeset.null-node-id": "R001",
  "nodeset.duplicate-node-id": "R002",
  "nodeset.type-cycle": "R027",
  "nodeset.namespace-missing": "R169",
  "node-id.namespace-index": "R172",
  "qualified-name.namespace-index": "R172",
  "nodeset.required-model-cycle": "R178",
  "nodeset.alias-unknown": "R188",
  "nodeset.alias-cycle": "R188",
  "nodeset.alias-defined-twice": "R188",
};

/** A finding with its place in the file that was read. */
export type PlacedFinding = Finding & { readonly line?: number; readonly column?: number };

/** Findings for those problems that a registered rule answers for. */
export function toFindings(problems: readonly Problem[]): PlacedFinding[] {
  return problems.flatMap((found) => {
    const rule = findRule(RULE_BY_CODE[found.code] ?? "");
    if (!rule) return [];
    const { line, column, attribute, path = "" } = found.at ?? {};
    const named = found.data?.["nodeId"];
    const node = found.at?.node ?? (typeof named === "string" ? named : "");
    return [
      {
        rule: rule.id,
        severity: rule.severity,
        nodeId: node,
        browseName: "",
        path,
        message: formatProblem(found),
        clause: rule.clause,
        facts: Object.entries(found.data ?? {}).map(([name, value]) => `${toLabel(name)}: ${String(value)}`),
        ...(attribute === undefined ? {} : { attribute }),
        ...(line === undefined ? {} : { line }),
        ...(column === undefined ? {} : { column }),
      },
    ];
  });
}

/** `firstLine` → `First line`, `nodeId` → `NodeId`. */
function toLabel(name: string): string {
  if (name === "nodeId") return "NodeId";
  const words = name.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);
  return words.charAt(0).toUpperCase() + words.slice(1);
}
