/** Machines stand on a frozen revision of their types, and follow a newer one machine by machine. */
import { afterAll, beforeAll, expect, test } from "vitest";
import type { Caller } from "~/auth/caller.server";
import { findMember } from "~/domain/address-space/browse";
import type { NodeKey } from "~/domain/address-space/node-id";
import { getValue, type Result } from "~/domain/core/result";
import { addVariable } from "~/domain/editing/commands/add-member";
import { setRange } from "~/domain/editing/commands/set-unit";
import type { CommandContext, Edit } from "~/domain/editing/edit-draft";
import { BlockAllocator } from "~/domain/editing/allocate-node-id";
import { StandardDataType, StandardModellingRule } from "~/domain/address-space/standard-ids";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { listMachines } from "~/domain/instantiation/list-machines";
import { MACHINES } from "~/domain/instantiation/roll-out-machines";
import { startTestApp, type TestApp } from "../support/test-app";
import { addOtherOrganization, setUpFirst } from "../support/test-people";

const MACHINERY = "http://opcfoundation.org/UA/Machinery/";
const WINCH = "http://merrow.example/UA/Winch/";

let app: TestApp;
let cookie: string;
let organizationId: string;
let caller: Caller;
let types: string;
let machines: string;

beforeAll(async () => {
  app = await startTestApp();
  ({ cookie, organizationId } = await setUpFirst(app));
  const { findCaller } = await import("~/auth/caller.server");
  const found = await findCaller(new Request("http://localhost:3000/", { headers: { cookie } }));
  if (!found) throw new Error("Nobody is signed in");
  caller = found;
});

afterAll(() => app.stop());

async function open(modelId: string) {
  const { loadWorkingModel } = await import("~/services/working-model.server");
  const working = await loadWorkingModel(modelId);
  if (!working) throw new Error("No such model");
  return working;
}

let nextId = 50_000;

async function edit(modelId: string, command: (space: AddressSpace, ids: CommandContext) => Result<Edit>): Promise<void> {
  const { appendTransactions } = await import("~/services/working-model.server");
  const working = await open(modelId);
  const ids = new BlockAllocator(working.model.namespaceUri, [{ from: nextId, to: nextId + 99 }]);
  nextId += 100;
  const { operations } = getValue(command(working.space, ids));
  const outcome = await appendTransactions(modelId, caller, { clientId: "w", base: working.seq, transactions: [{ clientSeq: nextId, label: "edit", operations }] });
  expect(outcome.kind).toBe("accepted");
}

/** A node below the type or machine, by names of its own namespace. */
function findBelow(space: AddressSpace, top: NodeKey, ...names: string[]): NodeKey | undefined {
  return names.reduce<NodeKey | undefined>((at, name) => at && (findMember(space, at, name, WINCH)?.key ?? findMember(space, at, name, "http://opcfoundation.org/UA/")?.key), top);
}

async function findType(): Promise<NodeKey> {
  const { space } = await open(types);
  const type = space.listOwnNodes().find((node) => node.browseName.name === "WinchType");
  if (!type) throw new Error("No type");
  return type.key;
}

const freeze = async (message: string) => {
  const { freezeRevision } = await import("~/services/freeze-revision.server");
  return getValue(await freezeRevision(caller, (await open(types)).model, message));
};

test("the retrofit starter is all of the new model or nothing", async () => {
  const { createModel } = await import("~/services/create-model.server");
  const intent = { kind: "types" as const, name: "Winch", namespaceUri: WINCH, version: "1.0.0", retrofitOf: "Winch" };
  const refused = await createModel(caller, organizationId, { ...intent, requiredModels: [] });
  expect(refused.ok).toBe(false);
  const { listModels } = await import("~/db/repositories/models.server");
  expect(await listModels(organizationId)).toEqual([]);
  const made = getValue(await createModel(caller, organizationId, { ...intent, requiredModels: ["http://opcfoundation.org/UA/DI/", MACHINERY] }));
  types = made.id;
  expect((await open(types)).seq).toBe(0);
  expect(findBelow((await open(types)).space, await findType(), "Energy", "ActivePower")).toBeDefined();
});

test("a model of machines is held at a frozen revision; edited types are frozen for it once", async () => {
  await edit(types, (space, ids) => {
    const parent = space.listOwnNodes().find((node) => node.browseName.name === "Process")?.key ?? ("" as NodeKey);
    return addVariable(space, ids, { parent, name: "RopeLength", dataType: StandardDataType.Float, rule: StandardModellingRule.Mandatory });
  });
  const { createModel } = await import("~/services/create-model.server");
  const made = await createModel(caller, organizationId, {
    kind: "machines",
    name: "Hall",
    namespaceUri: "http://merrow.example/UA/Winches/",
    version: "1.0.0",
    requiredModels: [WINCH, MACHINERY],
  });
  machines = getValue(made).id;
  const { model, layers, space } = await open(machines);
  expect(model.pins).toMatchObject([{ modelUri: WINCH, number: 1 }]);
  expect(layers.find((layer) => layer.modelUri === WINCH)?.packUrl).toBe(`/packs/${model.pins?.[0]?.packHash}`);
  expect(findBelow(space, await findType(), "Process", "RopeLength")).toBeDefined();
  const { listRevisions } = await import("~/db/repositories/models.server");
  expect((await listRevisions(types)).map((revision) => revision.message)).toEqual(["First revision, for the machines of Hall", "Created from the retrofit starter"]);
});

test("machines are made without a change of the type", async () => {
  const before = await open(types);
  const { rollOut } = await import("~/services/roll-out-machines.server");
  const rows = ["W1", "W2"].map((name) => ({ name, serialNumber: `S-${name}`, location: "" }));
  const intent = { type: await findType(), parent: MACHINES, optional: [], manufacturer: "", rows, nodeIds: { kind: "path" as const, pattern: "Hall.{name}", separator: "." as const } };
  getValue(await rollOut(caller, (await open(machines)).model, intent));
  getValue(await rollOut(caller, (await open(machines)).model, { ...intent, rows: [{ name: "W3", serialNumber: "", location: "Bay 3" }] }));
  const after = await open(types);
  expect(after.seq).toBe(before.seq);
  expect(after.space.own).toBe(before.space.own);
  const { space } = await open(machines);
  expect(listMachines(space).map(({ nodeId }) => nodeId)).toEqual(["W1", "W2", "W3"].map((name) => `nsu=http://merrow.example/UA/Winches/;s=Hall.${name}`));
  const again = await rollOut(caller, (await open(machines)).model, intent);
  expect(!again.ok && again.problems.map((found) => found.code)).toEqual(["roll-out.node-id-taken"]);
});

test("what is changed in the types reaches the machines when it is frozen and taken", async () => {
  const type = await findType();
  await edit(types, (space, ids) => {
    const parent = findBelow(space, type, "Process") ?? type;
    return addVariable(space, ids, { parent, name: "BrakeWear", dataType: StandardDataType.Float, rule: StandardModellingRule.Mandatory });
  });
  await edit(types, (space, ids) => setRange(space, ids, { variable: findBelow(space, type, "Energy", "ActivePower") ?? type, range: { low: 0, high: 250 } }));
  expect(findBelow((await open(machines)).space, type, "Process", "BrakeWear")).toBeUndefined();
  await freeze("Brake wear");
  expect(findBelow((await open(machines)).space, type, "Process", "BrakeWear")).toBeUndefined();

  const { previewRevision } = await import("~/services/take-revision.server");
  const preview = getValue(await previewRevision((await open(machines)).model, WINCH, 2));
  expect(preview).toMatchObject({ from: 1, to: 2 });
  // The new member has no unit, which the checker hints at once for each machine that gets it.
  expect(preview.findings.map(({ severity, path }) => [severity, path])).toEqual(["W1", "W2", "W3"].map((name) => ["hint", `${name}/Process/BrakeWear`]));
  expect(preview.comparison?.changes.map((change) => change.kind).sort()).toEqual(["member-added", "range-changed"]);
  expect(preview.machines.map(({ name, follows }) => [name, follows])).toEqual([["W1", 1], ["W2", 1], ["W3", 1]]);
  expect(preview.machines[0]?.facts.map(({ kind, path, to }) => [kind, path, to])).toEqual([
    ["changed-attribute", "Energy / ActivePower / EURange", expect.stringContaining("250")],
    ["missing-member", "Process / BrakeWear", undefined],
  ]);
  expect((await open(machines)).model.pins?.[0]?.number).toBe(1);
});

test("one machine follows, another later; each gets what its type got", async () => {
  const { takeRevision, previewRevision } = await import("~/services/take-revision.server");
  const keyOf = async (name: string) => listMachines((await open(machines)).space).find((machine) => machine.name === name)?.key ?? ("" as NodeKey);
  const wear = async (name: string) => findBelow((await open(machines)).space, await keyOf(name), "Process", "BrakeWear");
  const take = async (names: string[]) =>
    getValue(await takeRevision(caller, (await open(machines)).model, { modelUri: WINCH, number: 2, machines: await Promise.all(names.map(keyOf)), clientId: "window" }));

  const { seq } = await open(machines);
  await take(["W1"]);
  expect((await open(machines)).seq).toBe(seq + 1);
  expect([await wear("W1"), await wear("W2")]).toEqual([expect.any(String), undefined]);
  expect((await open(machines)).model.pins?.[0]).toMatchObject({ number: 2, behind: { [await keyOf("W2")]: 1, [await keyOf("W3")]: 1 } });

  const later = getValue(await previewRevision((await open(machines)).model, WINCH, 2));
  expect(later.machines.map(({ name, facts }) => [name, facts.length])).toEqual([["W1", 0], ["W2", 2], ["W3", 2]]);
  await take(["W2", "W3"]);
  expect(await wear("W3")).toBeDefined();
  expect((await open(machines)).model.pins?.[0]?.behind).toEqual({});

  // A restart finds the machines as they were, on the revision that was taken.
  const { forgetWorkingModel } = await import("~/services/working-model.server");
  const before = await open(machines);
  forgetWorkingModel(machines);
  const after = await open(machines);
  expect(after.space.listOwnNodes()).toEqual(before.space.listOwnNodes());
  expect(after.layers.map((layer) => layer.packUrl)).toEqual(before.layers.map((layer) => layer.packUrl));
  const missing = await takeRevision(caller, after.model, { modelUri: WINCH, number: 9, machines: [], clientId: "window" });
  expect(!missing.ok && missing.problems.map((found) => found.code)).toEqual(["pin.revision-missing"]);
});

test("the pack of a pinned revision is for those alone whose machines stand on it", async () => {
  const hash = (await open(machines)).model.pins?.[0]?.packHash;
  expect((await app.call("GET", `/packs/${hash}`, { cookie })).status).toBe(200);
  const other = await addOtherOrganization(app);
  expect((await app.call("GET", `/packs/${hash}`, { cookie: other.cookie })).status).toBe(404);
});

test("machines of a model from before are held as they stand when somebody asks for it", async () => {
  const { updateModelStatement, findModel, listRevisions } = await import("~/db/repositories/models.server");
  const { writeBatch } = await import("~/db/client.server");
  const { forgetWorkingModel } = await import("~/services/working-model.server");
  await writeBatch([updateModelStatement(machines, { pins: null })]);
  forgetWorkingModel(machines);
  const type = await findType();
  await edit(types, (space, ids) => setRange(space, ids, { variable: findBelow(space, type, "Energy", "ActivePower") ?? type, range: { low: 0, high: 300 } }));
  const before = await open(machines);
  const { holdTypes } = await import("~/services/hold-types.server");
  getValue(await holdTypes(caller, before.model));
  const [newest] = await listRevisions(types);
  expect(newest?.message).toBe("For the machines of Hall");
  expect((await findModel(machines))?.pins).toMatchObject([{ modelUri: WINCH, number: newest?.number }]);
  const after = await open(machines);
  const idOf = (space: AddressSpace) => space.layers.map((layer) => [layer.header.models[0]?.modelUri, layer.nodes.size]);
  expect(idOf(after.space)).toEqual(idOf(before.space));
});
