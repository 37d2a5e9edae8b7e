/** What the team looks at in the morning: models and machines with their findings, what was changed, what waits. */
import { listModels, listTransactions, type ModelRow } from "../db/repositories/models.server";
import type { AddressSpace } from "../domain/address-space/address-space";
import { findParent } from "../domain/address-space/browse";
import { formatNodeId, OPC_UA_NAMESPACE, type NodeKey } from "../domain/address-space/node-id";
import type { Finding } from "../domain/checks/finding";
import { formatProblem } from "../domain/core/problem-texts";
import { listMachines, type Machine, type MachineFigure } from "../domain/instantiation/list-machines";
import { checkModel, countFindings, type FindingCounts } from "./check-model.server";
import { readMachineFacts, type FactReader, type MachineFacts } from "./read-machine-facts.server";
import { loadWorkingModel } from "./working-model.server";

export type ModelSummary = {
  readonly id: string;
  readonly name: string;
  readonly kind: ModelRow["kind"];
  readonly namespaceUri: string;
  readonly version: string | null;
  readonly headSeq: number;
  readonly nodeCount: number;
  readonly updatedAt: string;
  readonly updatedBy: string;
  readonly tally: FindingCounts;
  /** Model URIs that it requires, the base model left out, as far as they are there. */
  readonly requires: readonly string[];
  /** Sentences about required models that are missing. */
  readonly missing: readonly string[];
};

export type ParkMachine = Omit<Machine, "state" | "figure"> & {
  readonly modelId: string;
  readonly facts: MachineFacts;
  readonly tally: FindingCounts;
  /** NodeId texts to watch while a test server serves the model. */
  readonly stateNodeId: string | null;
  readonly figure: (Pick<MachineFigure, "name" | "unit" | "range"> & { readonly nodeId: string }) | null;
};

export type RecentEdit = {
  readonly modelId: string;
  readonly modelName: string;
  readonly seq: number;
  readonly author: string;
  readonly label: string;
  readonly at: string;
};

export type Park = {
  readonly models: readonly ModelSummary[];
  readonly machines: readonly ParkMachine[];
  readonly edits: readonly RecentEdit[];
};

const MAX_EDITS = 8;

export async function listModelSummaries(organizationId: string): Promise<ModelSummary[]> {
  return (await readPark(organizationId)).models.slice();
}

export async function readPark(organizationId: string): Promise<Park> {
  const models: ModelSummary[] = [];
  const machines: ParkMachine[] = [];
  for (const row of await listModels(organizationId)) {
    const working = await loadWorkingModel(row.id);
    const checked = await checkModel(row.id);
    if (!working || !checked) continue;
    const { findings } = checked;
    const tally = countFindings(findings);
    const requires = working.layers.map((layer) => layer.modelUri).filter((uri) => uri !== OPC_UA_NAMESPACE);
    models.push({ ...summarize(working.model), tally, requires, missing: working.missing.map(formatProblem) });
    if (row.kind === "machines") machines.push(...toParkMachines(row.id, working.space, findings, await readMachineFacts(working.model)));
  }
  return { models, machines, edits: await listRecentEdits(models) };
}

function summarize(row: ModelRow) {
  const { id, name, kind, namespaceUri, version, headSeq, nodeCount, updatedAt, updatedBy } = row;
  return { id, name, kind, namespaceUri, version, headSeq, nodeCount, updatedAt: updatedAt.toISOString(), updatedBy };
}

function toParkMachines(modelId: string, space: AddressSpace, findings: readonly Finding[], readFacts: FactReader): ParkMachine[] {
  const toNodeId = (key: NodeKey | undefined) => {
    const node = key === undefined ? undefined : space.getNode(key);
    return node ? formatNodeId(node.nodeId) : null;
  };
  return listMachines(space).map(({ state, figure, ...machine }) => ({
    ...machine,
    modelId,
    facts: readFacts(space, { state, figure, ...machine }),
    tally: countFindings(findings.filter((finding) => isBelow(space, finding.key, machine.key))),
    stateNodeId: toNodeId(state),
    figure: figure
      ? { name: figure.name, unit: figure.unit, range: figure.range, nodeId: toNodeId(figure.key) ?? "" }
      : null,
  }));
}

function isBelow(space: AddressSpace, key: NodeKey | undefined, ancestor: NodeKey): boolean {
  const seen = new Set<NodeKey>();
  for (let at = key; at !== undefined && !seen.has(at); at = findParent(space, at)) {
    if (at === ancestor) return true;
    seen.add(at);
  }
  return false;
}

async function listRecentEdits(models: readonly ModelSummary[]): Promise<RecentEdit[]> {
  const pages = await Promise.all(
    models.map(async ({ id, name, headSeq }) => {
      const transactions = await listTransactions(id, Math.max(0, headSeq - MAX_EDITS), MAX_EDITS);
      return transactions.map(({ seq, author, label, at }) => ({
        modelId: id,
        modelName: name,
        seq,
        author,
        label,
        at,
      }));
    }),
  );
  return pages
    .flat()
    .sort((a, b) => (a.at < b.at ? 1 : -1))
    .slice(0, MAX_EDITS);
}
