/**
 * The update of machines to another frozen revision of their types: first what would change, machine by machine, then the
 * chosen machines in one transaction, together with the pin. Machines that are left out keep what they have and may follow later.
 */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { findModel, type ModelRow } from "../db/repositories/models.server";
import type { PinRow } from "../db/schema/models";
import type { AddressSpace } from "../domain/address-space/address-space";
import type { NodeKey } from "../domain/address-space/node-id";
import { getPath } from "../domain/address-space/browse";
import { runChecks } from "../domain/checks/run-checks";
import type { Comparison } from "../domain/compare/change";
import { compareModels } from "../domain/compare/compare-models";
import { fail, ok, problem, type Result, type Severity } from "../domain/core/result";
import { BlockAllocator } from "../domain/editing/allocate-node-id";
import { applyOperations } from "../domain/editing/apply-operation";
import { setRequiredModels } from "../domain/editing/commands/set-model-info";
import type { CommandContext, Edit } from "../domain/editing/edit-draft";
import { EditSequence } from "../domain/editing/starters/edit-sequence";
import { applyConsequences, type Consequence } from "../domain/instantiation/consequences";
import { listMachines } from "../domain/instantiation/list-machines";
import { describeUpdate, listMachineUpdates, type UpdateFact } from "../domain/instantiation/machine-updates";
import { toRequiredEntry } from "./create-model.server";
import { makeWithIds } from "./lease-node-ids.server";
import { loadState } from "./load-revision.server";
import { movePin } from "./pins.server";
import { resolveRequiredModels, type RequiredLayer } from "./required-models.server";
import { appendTransactions, loadWorkingModel, type WorkingModel } from "./working-model.server";

export const takeRevisionSchema = z.object({
  modelUri: z.string().min(1).max(400),
  number: z.number().int().min(0),
  /** Keys of the machines that follow now. */
  machines: z.array(z.string().max(1000)).max(10_000),
  clientId: z.string().max(100),
});
export type TakeRevisionIntent = z.infer<typeof takeRevisionSchema>;

export type MachinePreview = {
  readonly key: string;
  readonly name: string;
  /** The revision that it follows now. */
  readonly follows: number;
  readonly facts: readonly UpdateFact[];
};

export type RevisionPreview = {
  readonly modelUri: string;
  readonly from: number;
  readonly to: number;
  /** What changed in the types themselves; undefined when the model of the types is gone. */
  readonly comparison: Comparison | undefined;
  readonly machines: readonly MachinePreview[];
  /** Findings that are there when all machines have followed, and not before. */
  readonly findings: readonly { readonly rule: string; readonly severity: Severity; readonly message: string; readonly path: string }[];
};

type Planned = {
  readonly working: WorkingModel;
  readonly pin: PinRow;
  readonly moved: PinRow;
  readonly pins: readonly PinRow[];
  readonly layers: readonly RequiredLayer[];
  /** The machines as they are, on the new revision. */
  readonly after: AddressSpace;
  readonly updates: readonly { machine: NodeKey; follows: number; consequences: readonly Consequence[] }[];
};

/** Problems: `request.not-found`; `pin.revision-missing`. */
export async function previewRevision(model: ModelRow, modelUri: string, number: number): Promise<Result<RevisionPreview>> {
  const planned = await plan(model, modelUri, number);
  if (!planned.ok) return planned;
  const { pin, moved, after, updates, working } = planned.value;
  const types = await findModel(pin.modelId);
  const [old, now] = types ? [await loadState(types, pin.number), await loadState(types, number)] : [];
  const edit = makeEdit(planned.value, scratchIds(working), updates.flatMap((update) => update.consequences));
  const followed = edit.ok ? applyOperations(after, edit.value.operations) : edit;
  if (!followed.ok) return followed;
  const names = new Map(listMachines(working.space).map(({ key, name }) => [key, name]));
  return ok({
    modelUri,
    from: pin.number,
    to: moved.number,
    comparison: old && now ? compareModels(old, now) : undefined,
    machines: updates.map(({ machine, follows, consequences }) => ({
      key: machine,
      name: names.get(machine) ?? machine,
      follows,
      facts: consequences.map((consequence) => describeUpdate(after, machine, consequence)),
    })),
    findings: listNewFindings(working.space, followed.value),
  });
}

/** Problems: as above, those of the commands, `transactions.stale`. */
export async function takeRevision(author: Caller, model: ModelRow, intent: TakeRevisionIntent): Promise<Result<null>> {
  const planned = await plan(model, intent.modelUri, intent.number);
  if (!planned.ok) return planned;
  const { working, pin, moved, pins, updates } = planned.value;
  const chosen = new Set(intent.machines);
  const followers = updates.filter(({ machine }) => chosen.has(machine));
  const consequences = followers.flatMap((update) => update.consequences);
  const edit = await makeWithIds(author, model, intent.clientId, planned.value.after, (ids) => makeEdit(planned.value, ids, consequences));
  if (!edit.ok) return edit;
  const left = updates.filter(({ machine, follows, consequences }) => !chosen.has(machine) && follows !== moved.number && consequences.length > 0);
  const behind = Object.fromEntries(left.map(({ machine, follows }) => [machine, follows]));
  const outcome = await appendTransactions(model.id, author, {
    clientId: `take-revision-${intent.clientId}`,
    base: working.seq,
    transactions: [{ clientSeq: working.seq + 1, label: "take-revision", operations: edit.value.operations }],
    pins: pins.map((other) => (other.modelUri === pin.modelUri ? { ...moved, behind } : other)),
    window: intent.clientId,
  });
  if (outcome.kind === "accepted") return ok(null);
  return fail(...(outcome.kind === "refused" ? outcome.problems : [problem("transactions.stale")]));
}

async function plan(model: ModelRow, modelUri: string, number: number): Promise<Result<Planned>> {
  const working = await loadWorkingModel(model.id);
  if (!working) return fail(problem("request.not-found"));
  const known = working.model.pins ?? [];
  const pin = known.find((other) => other.modelUri === modelUri);
  if (!pin) return fail(problem("request.not-found"));
  const moved = await movePin(pin, number);
  if (!moved) return fail(problem("pin.revision-missing", { number }));
  const pins = known.map((other) => (other === pin ? moved : other));
  const { header } = working.space.own;
  const required = await resolveRequiredModels(model.organizationId, header, pins);
  if (required.missing.length > 0) return fail(...required.missing);
  const after = onLayers(working.space, required.layers);
  const updates: Planned["updates"][number][] = [];
  const followed = new Map<number, AddressSpace>([[pin.number, working.space]]);
  for (const { key } of listMachines(working.space)) {
    const follows = pin.behind[key] ?? pin.number;
    if (!followed.has(follows)) {
      const earlier = await movePin(pin, follows);
      const layers = earlier && (await resolveRequiredModels(model.organizationId, header, known.map((other) => (other === pin ? earlier : other)))).layers;
      followed.set(follows, layers ? onLayers(working.space, layers) : working.space);
    }
    updates.push({ machine: key, follows, consequences: [] });
  }
  for (const [follows, before] of followed) {
    const found = new Map(listMachineUpdates(before, after).map(({ machine, consequences }) => [machine, consequences]));
    updates.forEach((update, i) => {
      if (update.follows === follows) updates[i] = { ...update, consequences: found.get(update.machine) ?? [] };
    });
  }
  return ok({ working, pin, moved, pins, layers: required.layers, after, updates });
}

function onLayers(space: AddressSpace, layers: readonly RequiredLayer[]): AddressSpace {
  return space.withRequired(layers.map(({ layer }) => layer));
}

/** The consequences, and the version of the types in the header. */
function makeEdit({ after, layers }: Planned, ids: CommandContext, consequences: readonly Consequence[]): Result<Edit> {
  const sequence = new EditSequence(after, ids);
  const rows = after.own.header.models[0]?.requiredModels ?? [];
  const requiredModels = rows.map((row) => {
    const layer = layers.find((other) => other.modelUri === row.modelUri);
    return layer ? toRequiredEntry(layer) : row;
  });
  if (JSON.stringify(requiredModels) !== JSON.stringify(rows)) sequence.do((s, c) => setRequiredModels(s, c, { requiredModels }));
  sequence.do((s, c) => applyConsequences(s, c, { consequences }));
  return sequence.finish();
}

/** Above all that is leased, so that a scratch id never meets a real one. */
const SCRATCH_FROM = 3_600_000_000;

function scratchIds({ model }: WorkingModel): CommandContext {
  return new BlockAllocator(model.namespaceUri, [{ from: SCRATCH_FROM, to: SCRATCH_FROM + 1_000_000 }]);
}

function listNewFindings(before: AddressSpace, after: AddressSpace): RevisionPreview["findings"] {
  const nameOf = (rule: string, key: NodeKey | undefined, message: string): string => `${rule} ${key ?? ""} ${message}`;
  const known = new Set(runChecks(before).map((finding) => nameOf(finding.rule, finding.key, finding.message)));
  return runChecks(after)
    .filter((finding) => !known.has(nameOf(finding.rule, finding.key, finding.message)))
    .slice(0, 200)
    .map(({ rule, severity, message, key }) => ({ rule, severity, message, path: key === undefined ? "" : getPath(after, key) }));
}
