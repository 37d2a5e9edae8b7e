/** What is handed out of a mapping: documents, tables, Thing Descriptions and what templates make of it. */
import { findModel, type ModelRow } from "../db/repositories/models.server";
import { findExportTemplate } from "../db/repositories/export-templates.server";
import type { AddressSpace } from "../domain/address-space/address-space";
import { getDisplayName } from "../domain/address-space/browse";
import type { NodeKey } from "../domain/address-space/node-id";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { applyMappingDocument, makeMachineDocument, makeTypeDocument } from "../domain/deliver/make-mapping-document";
import { listOutputs, writeMappingCsv } from "../domain/deliver/mapping-csv";
import { readMappingDocument, writeMappingDocument, type MappingDocument } from "../domain/deliver/mapping-document";
import { makeTemplateData } from "../domain/deliver/template-data";
import { makeThingDescription, writeThingDescription, type ThingReport } from "../domain/deliver/thing-description";
import { listMachines } from "../domain/instantiation/list-machines";
import { listMachineTypes } from "../domain/mapping/list-targets";
import { listOwners, listParts } from "../domain/mapping/mapping-entries";
import type { Caller } from "../auth/caller.server";
import { newId } from "../utils/ids.server";
import { loadPlannedSources } from "./load-planned-sources.server";
import { renderTemplate } from "./render-template.server";
import { writeSignalList } from "./write-signal-list.server";
import { appendTransactions, loadWorkingModel } from "./working-model.server";

export const deliverables = ["document", "csv", "thing-description", "signal-list", "template"] as const;
export type Deliverable = (typeof deliverables)[number];

export type DeliverIntent = {
  readonly what: Deliverable;
  /** A machine of a machines model, or a machine type of a types model, by key or name; the only one when left out. */
  readonly of?: string;
  /** For `template`. */
  readonly templateId?: string;
};

export type Delivered = {
  readonly fileName: string;
  readonly type: string;
  readonly content: string | Uint8Array;
  /** Variables that the rows write; an export shows and counts them. */
  readonly outputs: readonly string[];
  readonly report: readonly ThingReport[];
};

/** Problems: `request.not-found`, `deliver.choose`, `deliver.no-mapping`, those of templates. */
export async function deliverMapping(model: ModelRow, intent: DeliverIntent): Promise<Result<Delivered>> {
  const working = await loadWorkingModel(model.id);
  if (!working) return fail(problem("request.not-found"));
  const { space } = working;
  if (intent.what === "signal-list") return deliverSignals(model, space, intent);
  const document = await makeDocument(model, space, intent.of);
  if (!document.ok) return document;
  const name = toFileStem(document.value);
  const common = { outputs: listOutputs(document.value.mapping.rows), report: [] };
  switch (intent.what) {
    case "document":
      return ok({ ...common, fileName: `${name}.mapping.json`, type: "application/json", content: writeMappingDocument(document.value) });
    case "csv":
      return ok({ ...common, fileName: `${name}.mapping.csv`, type: "text/csv; charset=utf-8", content: writeMappingCsv(document.value) });
    case "thing-description": {
      if (!document.value.machine) return fail(problem("deliver.machine-only"));
      const described = makeThingDescription(document.value);
      return ok({ ...common, report: described.report, fileName: `${name}.td.json`, type: "application/td+json", content: writeThingDescription(described) });
    }
    case "template": {
      const row = intent.templateId === undefined ? undefined : await findExportTemplate(intent.templateId);
      if (row?.organizationId !== model.organizationId) return fail(problem("request.not-found"));
      const text = await renderTemplate(row.template, makeTemplateData(document.value));
      return text.ok ? ok({ ...common, fileName: row.fileName.replaceAll("{name}", name), type: "text/plain; charset=utf-8", content: text.value }) : text;
    }
  }
}

/** The document of a machine or a machine type, by key or name; the only one when nothing is said. */
export async function makeDocument(model: ModelRow, space: AddressSpace, of: string | undefined): Promise<Result<MappingDocument>> {
  if (model.kind === "machines") {
    const machines = listMachines(space);
    const machine = of === undefined && machines.length === 1 ? machines[0] : machines.find((m) => m.key === of || m.name === of);
    if (!machine) return fail(problem("deliver.choose", { choices: machines.map((m) => m.name).join(", ") || "none" }));
    return makeMachineDocument(space, machine.key, await loadPlannedSources(model.organizationId));
  }
  const types = listOwners(space, "row").map((key) => ({ key, name: space.getNode(key)?.browseName.name ?? key }));
  const type = of === undefined && types.length === 1 ? types[0] : types.find((t) => t.key === of || t.name === of);
  return type ? ok(makeTypeDocument(space, type.key)) : fail(problem("deliver.choose", { choices: types.map((t) => t.name).join(", ") || "none" }));
}

function toFileStem({ machine, mapping }: MappingDocument): string {
  return (machine?.name ?? mapping.machineType).replace(/[^\w.-]+/g, "-");
}

async function deliverSignals(model: ModelRow, space: AddressSpace, { of }: DeliverIntent): Promise<Result<Delivered>> {
  const owners = listOwners(space, "signal");
  const type = owners.find((key) => key === of || space.getNode(key)?.browseName.name === of) ?? owners[0] ?? listMachineTypes(space)[0]?.key;
  if (type === undefined) return fail(problem("deliver.choose", { choices: "none" }));
  const node = space.getNode(type);
  const name = node ? getDisplayName(node) : model.name;
  const signals = listParts(space, "signal", type).map((s) => s.value);
  const mapping = listParts(space, "row", type).length > 0 ? makeTypeDocument(space, type) : undefined;
  const content = await writeSignalList(name, signals, mapping);
  const sheetType = "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet";
  return ok({ fileName: `${name.replace(/[^\w.-]+/g, "-")}-signals.xlsx`, type: sheetType, content, outputs: [], report: [] });
}

/** Gives a machine type the mapping of a document, in one edit. Problems: those of the document, `request.not-found`, `transactions.stale`. */
export async function importMappingDocument(caller: Caller, model: ModelRow, typeKey: string | undefined, text: string): Promise<Result<{ operations: number }>> {
  const document = readMappingDocument(text);
  if (!document.ok) return document;
  const working = await loadWorkingModel(model.id);
  if (!working) return fail(problem("request.not-found"));
  const { space, seq } = working;
  const wanted = document.value.mapping.machineType;
  const type = space.listOwnNodes().find((n) => n.nodeClass === "ObjectType" && (typeKey === undefined ? n.browseName.name === wanted : n.key === typeKey || n.browseName.name === typeKey));
  if (!type) return fail(problem("deliver.no-type", { name: typeKey ?? wanted }));
  const operations = applyMappingDocument(space, type.key as NodeKey, document.value);
  if (!operations.ok) return operations;
  if (operations.value.length === 0) return ok({ operations: 0 });
  const transactions = [{ clientSeq: 1, label: "import-mapping", operations: operations.value }];
  const outcome = await appendTransactions(model.id, caller, { clientId: `import-${newId()}`, base: seq, transactions });
  if (outcome.kind === "accepted") return ok({ operations: operations.value.length });
  return fail(...(outcome.kind === "refused" ? outcome.problems : [problem("transactions.stale")]));
}

/** The model behind an id, for who has only that. */
export async function findOwnModel(organizationId: string, modelId: string): Promise<ModelRow | undefined> {
  const model = await findModel(modelId);
  return model?.organizationId === organizationId ? model : undefined;
}
