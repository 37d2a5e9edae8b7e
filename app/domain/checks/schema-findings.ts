/** Faults against the schema as findings of R191, each at the node whose element holds the line. */
import type { AddressSpace } from "../address-space/address-space";
import { getPath } from "../address-space/browse";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import type { Problem } from "../core/result";
import { SCHEMA_VALID } from "./file-rules";
import type { PlacedFinding } from "./problem-findings";
import type { ReportSources } from "./to-report";

/** `faults` are problems `xsd.invalid` with their line; one line is told once. */
export function toSchemaFindings(
  space: AddressSpace,
  faults: readonly Problem[],
  lines: ReportSources["lines"],
): PlacedFinding[] {
  const starts = [...lines].map(([key, at]) => ({ key, line: typeof at === "number" ? at : at.line }));
  starts.sort((a, b) => a.line - b.line);
  const seen = new Set<string>();
  return faults.flatMap(({ at, data }) => {
    const { line = 1, column = 1 } = at ?? {};
    const detail = String(data?.["detail"] ?? "").replace(/\{[^}]*\}/g, "");
    if (seen.has(`${line} ${detail}`)) return [];
    seen.add(`${line} ${detail}`);
    const key = starts.findLast((start) => start.line <= line)?.key;
    return [
      {
        rule: SCHEMA_VALID.id,
        severity: SCHEMA_VALID.severity,
        ...place(space, key),
        message: `Line ${line} is not valid against UANodeSet.xsd.`,
        clause: SCHEMA_VALID.clause,
        facts: [`Schema: ${detail}`, "The schema is that of the published NodeSets, with DesignToolOnly added."],
        line,
        column,
      },
    ];
  });
}

function place(space: AddressSpace, key: NodeKey | undefined) {
  const node = key === undefined ? undefined : space.own.nodes.get(key);
  if (!node) return { nodeId: "", browseName: "", path: "" };
  const { nodeId, browseName } = node;
  return {
    key: node.key,
    nodeId: formatNodeId(nodeId),
    browseName: browseName.name,
    path: getPath(space, node.key),
  };
}
