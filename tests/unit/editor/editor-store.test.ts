import { describe, expect, it } from "vitest";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { numericNodeId, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import type { Node } from "~/domain/address-space/node";
import { applyWithInverse } from "~/domain/editing/invert-operation";
import type { Operation, Transaction } from "~/domain/editing/operation";
import { rebase } from "~/domain/editing/rebase";
import { EditorStore } from "~/editor/editor-store";
import type { OutgoingTransaction, PostOutcome, SyncTransport } from "~/editor/sync-transport";
import { smallStandard, TEST_NAMESPACE } from "../../support/small-standard";

const header = { namespaceUris: [TEST_NAMESPACE], models: [{ modelUri: TEST_NAMESPACE, requiredModels: [] }] };

function makeObject(id: number, name: string): Node {
  const nodeId = numericNodeId(TEST_NAMESPACE, id);
  return {
    key: toNodeKey(nodeId),
    nodeId,
    nodeClass: "Object",
    order: id,
    browseName: { namespaceUri: TEST_NAMESPACE, name },
    displayName: [{ text: name }],
    references: [],
  } as Node;
}

const keyOf = (id: number): NodeKey => toNodeKey(numericNodeId(TEST_NAMESPACE, id));
const start = AddressSpace.of([smallStandard], buildLayer(header, [makeObject(1, "Pump"), makeObject(2, "Tank")]));
const setName = (id: number, text: string): Operation => ({
  kind: "setAttribute",
  key: keyOf(id),
  attribute: "displayName",
  value: [{ text }],
});
const nameOf = (space: AddressSpace, id: number): string | undefined => space.getNode(keyOf(id))?.displayName[0]?.text;

/** A server after the contract of the data routes: one list of transactions, 409 when the base is old, a resend answers as before. */
class FakeServer {
  space = start;
  readonly list: Transaction[] = [];
  isReachable = true;
  isAnswerLost = false;
  readonly listeners: ((transaction: Transaction) => void)[] = [];

  post(clientId: string, base: number, transactions: readonly OutgoingTransaction[]): PostOutcome {
    if (!this.isReachable) return { kind: "unreachable" };
    const known = this.list.filter(
      (t) => t.clientId === clientId && transactions.some((o) => o.clientSeq === t.clientSeq),
    );
    const fresh = transactions.filter((o) => !known.some((t) => t.clientSeq === o.clientSeq));
    const between = this.list.slice(base);
    if (fresh.length > 0 && between.some((t) => !known.includes(t)))
      return { kind: "stale", head: this.list.length, between };
    for (const { clientSeq, label, operations } of fresh) {
      const applied = applyWithInverse(this.space, operations);
      if (!applied.ok)
        return { kind: "refused", problems: applied.problems.map((p) => ({ ...p, data: { ...p.data, clientSeq } })) };
      this.space = applied.value.space;
      const seq = this.list.length + 1;
      const transaction = {
        seq,
        base: seq - 1,
        clientId,
        clientSeq,
        author: clientId,
        at: "2026-12-01T07:00:00Z",
        label,
        operations,
        inverse: applied.value.inverse,
      };
      this.list.push(transaction);
      for (const listener of this.listeners) listener(transaction);
    }
    if (this.isAnswerLost) return { kind: "unreachable" };
    const accepted = this.list.filter(
      (t) => t.clientId === clientId && transactions.some((o) => o.clientSeq === t.clientSeq),
    );
    return { kind: "accepted", head: this.list.length, accepted };
  }
}

function openWindow(server: FakeServer, clientId: string, hears = true) {
  const waiting: (() => void)[] = [];
  const refused: string[] = [];
  const transport: SyncTransport = {
    post: async (base, transactions) => server.post(clientId, base, transactions),
    listSince: async (seq) => (server.isReachable ? server.list.slice(seq) : undefined),
    lease: async () => ({ block: { from: 5000, to: 5999 } }),
  };
  const store = new EditorStore({
    space: start,
    seq: 0,
    clientId,
    canEdit: true,
    transport,
    schedule: (run) => {
      waiting.push(run);
      return () => waiting.splice(waiting.indexOf(run), 1);
    },
    onRefused: (list) => refused.push(...list.map((r) => r.pending.label)),
  });
  if (hears) server.listeners.push((transaction) => store.receive(transaction));
  const settle = async (): Promise<void> => {
    for (let i = 0; i < 20; i++) await Promise.resolve();
  };
  const runTimers = async (): Promise<void> => {
    for (const run of waiting.splice(0)) run();
    await settle();
  };
  return { store, refused, settle, runTimers };
}

describe("an edit", () => {
  it("is shown at once and saved afterwards", async () => {
    const server = new FakeServer();
    const { store, settle } = openWindow(server, "a");
    expect(store.dispatch("rename", [setName(1, "Pump 1")]).ok).toBe(true);
    expect(nameOf(store.getState().space, 1)).toBe("Pump 1");
    expect(store.getState().sync).toBe("saving");
    await settle();
    expect(store.getState()).toMatchObject({ sync: "saved", pendingCount: 0, seq: 1 });
    expect(nameOf(server.space, 1)).toBe("Pump 1");
  });

  it("that cannot be applied answers the problem and changes nothing", () => {
    const { store } = openWindow(new FakeServer(), "a");
    const before = store.getState();
    const result = store.dispatch("rename", [setName(99, "Nobody")]);
    expect(result.ok ? [] : result.problems.map((p) => p.code)).toEqual(["operation.node-missing"]);
    expect(store.getState()).toBe(before);
  });

  it("waits while the server is away and is not applied twice when an answer was lost", async () => {
    const server = new FakeServer();
    const { store, settle, runTimers } = openWindow(server, "a", false);
    server.isReachable = false;
    store.dispatch("rename", [setName(1, "Pump 1")]);
    store.dispatch("rename", [setName(2, "Tank 1")]);
    await settle();
    expect(store.getState()).toMatchObject({ sync: "offline", pendingCount: 2 });
    server.isReachable = true;
    server.isAnswerLost = true;
    await runTimers();
    expect(server.list).toHaveLength(2);
    server.isAnswerLost = false;
    await runTimers();
    expect(server.list).toHaveLength(2);
    expect(store.getState()).toMatchObject({ sync: "saved", pendingCount: 0, seq: 2 });
  });
});

describe("two windows", () => {
  it("see each other's edits and keep edits of different nodes", async () => {
    const server = new FakeServer();
    const one = openWindow(server, "a");
    const two = openWindow(server, "b");
    one.store.dispatch("rename", [setName(1, "Pump A")]);
    two.store.dispatch("rename", [setName(2, "Tank B")]);
    await one.settle();
    await two.settle();
    for (const { store, refused } of [one, two]) {
      expect([nameOf(store.getState().space, 1), nameOf(store.getState().space, 2)]).toEqual(["Pump A", "Tank B"]);
      expect(store.getState()).toMatchObject({ sync: "saved", seq: 2 });
      expect(refused).toEqual([]);
    }
  });

  it("refuse the later of two edits of one attribute, tell it, and end equal", async () => {
    const server = new FakeServer();
    const one = openWindow(server, "a");
    const two = openWindow(server, "b", false);
    one.store.dispatch("first", [setName(1, "Pump A")]);
    await one.settle();
    two.store.dispatch("second", [setName(1, "Pump B")]);
    two.store.dispatch("other", [setName(2, "Tank B")]);
    await two.settle();
    expect(two.refused).toEqual(["second"]);
    expect(nameOf(two.store.getState().space, 1)).toBe("Pump A");
    expect(nameOf(two.store.getState().space, 2)).toBe("Tank B");
    expect(two.store.getState()).toMatchObject({ sync: "saved", pendingCount: 0 });
    expect(nameOf(server.space, 2)).toBe("Tank B");
  });

  it("catch up with what a window missed, also when messages come in another order", async () => {
    const server = new FakeServer();
    const one = openWindow(server, "a");
    const two = openWindow(server, "b", false);
    for (const text of ["A", "B", "C"]) one.store.dispatch("rename", [setName(1, text)]);
    await one.settle();
    two.store.receive(server.list[2] as Transaction);
    await two.settle();
    expect(two.store.getState().seq).toBe(3);
    expect(nameOf(two.store.getState().space, 1)).toBe("C");
  });
});

describe("undo", () => {
  it("takes own edits back as new transactions and does them again", async () => {
    const server = new FakeServer();
    const { store, settle } = openWindow(server, "a");
    store.dispatch("rename", [setName(1, "Pump 1")]);
    store.dispatch("rename", [setName(1, "Pump 2")]);
    expect(store.undo().ok).toBe(true);
    expect(nameOf(store.getState().space, 1)).toBe("Pump 1");
    expect(store.undo().ok).toBe(true);
    expect(nameOf(store.getState().space, 1)).toBe("Pump");
    expect(store.undo().ok).toBe(false);
    store.redo();
    store.redo();
    await settle();
    expect(nameOf(server.space, 1)).toBe("Pump 2");
    expect(store.getState()).toMatchObject({ sync: "saved", redoLabel: undefined });
  });

  it("is refused where somebody else changed the same thing since", async () => {
    const server = new FakeServer();
    const one = openWindow(server, "a");
    const two = openWindow(server, "b");
    one.store.dispatch("rename", [setName(1, "Pump A")]);
    await one.settle();
    two.store.dispatch("rename", [setName(1, "Pump B")]);
    await two.settle();
    const result = one.store.undo();
    expect(result.ok ? [] : result.problems.map((p) => p.code)).toEqual(["operation.stale"]);
    expect(nameOf(one.store.getState().space, 1)).toBe("Pump B");
  });
});

it("goes on with the edits of an earlier page of the same window", async () => {
  const server = new FakeServer();
  const first = openWindow(server, "a");
  server.isReachable = false;
  first.store.dispatch("rename", [setName(1, "Pump 1")]);
  await first.settle();
  const { pending } = first.store.listUnsaved();
  first.store.dispose();
  server.isReachable = true;
  const store = new EditorStore({
    space: start,
    seq: 0,
    clientId: "a",
    canEdit: true,
    transport: {
      post: async (base, transactions) => server.post("a", base, transactions),
      listSince: async () => [],
      lease: async () => undefined,
    },
    schedule: () => () => undefined,
    restored: { pending, blocks: [], base: 0 },
  });
  store.dispatch("rename", [setName(2, "Tank 1")]);
  await first.settle();
  expect(server.list.map((t) => t.clientSeq)).toEqual([1, 2]);
  expect(nameOf(server.space, 1)).toBe("Pump 1");
});

it("answers as the domain's rebase does", () => {
  const pending = [{ operations: [setName(1, "B")] }];
  expect(rebase(start, [{ operations: [setName(1, "A")] }], pending).refused).toHaveLength(1);
});
