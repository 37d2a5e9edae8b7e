/**
 * What an export template sees: plain data, nothing that can be called. `rows` has one entry a row of the mapping in the
 * order of the type; `row.source` and `row.transforms` are as in the mapping document, `row.line` tells them in words.
 */
import { listMappingLines } from "./mapping-csv";
import type { MappingDocument } from "./mapping-document";

export type TemplateData = Readonly<Record<string, unknown>>;

export function makeTemplateData(document: MappingDocument): TemplateData {
  const lines = listMappingLines(document);
  const bindings = new Map(document.machine?.bindings.map((b) => [b.role, b] as const));
  return {
    model: document.model,
    machineType: document.mapping.machineType,
    machine: document.machine ? { name: document.machine.name, nodeId: document.machine.nodeId } : null,
    roles: document.mapping.roles.map((role) => ({ ...role, binding: bindings.get(role.role) ?? null })),
    layouts: document.layouts,
    rows: document.mapping.rows.map((row, i) => {
      const role = "role" in row.source ? row.source.role : undefined;
      return {
        ...row,
        direction: row.direction ?? "in",
        line: lines[i],
        node: document.nodes.find((n) => n.target === row.target) ?? null,
        binding: role === undefined ? null : (bindings.get(role) ?? null),
      };
    }),
  };
}
