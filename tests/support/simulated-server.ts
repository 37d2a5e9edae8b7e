import type { AddressSpace } from "~/domain/address-space/address-space";
import { applyWithInverse } from "~/domain/editing/invert-operation";
import type { Transaction } from "~/domain/editing/operation";
import type { EditorOptions } from "~/editor/editor-state";
import { EditorStore } from "~/editor/editor-store";
import type { OutgoingTransaction, PostOutcome, SyncTransport } from "~/editor/sync-transport";

/** A server after the contract of the data routes, in memory: one list, 409 on an old base, a resend answers as before. */
export class SimulatedServer {
  space: AddressSpace;
  readonly start: AddressSpace;
  readonly list: Transaction[] = [];
  posts = 0;

  constructor(start: AddressSpace) {
    this.start = start;
    this.space = start;
  }

  post(clientId: string, base: number, transactions: readonly OutgoingTransaction[]): PostOutcome {
    this.posts++;
    if (this.posts > 2000)
      throw new Error(
        `The server is asked without end: ${JSON.stringify({ clientId, base, transactions }).slice(0, 300)} ${this.list.length}`,
      );
    const sent = new Set(transactions.map((t) => t.clientSeq));
    const isKnown = (t: Transaction): boolean => t.clientId === clientId && sent.has(t.clientSeq);
    const known = new Set(this.list.filter(isKnown).map((t) => t.clientSeq));
    const fresh = transactions.filter((t) => !known.has(t.clientSeq));
    const between = this.list.slice(base);
    if (fresh.length > 0 && between.some((t) => !isKnown(t))) return { kind: "stale", head: this.list.length, between };
    let space = this.space;
    const added: Transaction[] = [];
    for (const { clientSeq, label, operations } of fresh) {
      const applied = applyWithInverse(space, operations);
      if (!applied.ok)
        return { kind: "refused", problems: applied.problems.map((p) => ({ ...p, data: { ...p.data, clientSeq } })) };
      space = applied.value.space;
      const seq = this.list.length + added.length + 1;
      const { inverse } = applied.value;
      added.push({
        seq,
        base: seq - 1,
        clientId,
        clientSeq,
        author: clientId,
        at: "2024-05-01T08:00:00Z",
        label,
        operations,
        inverse,
      });
    }
    this.space = space;
    this.list.push(...added);
    return { kind: "accepted", head: this.list.length, accepted: this.list.filter(isKnown) };
  }
}

/** A window whose network, timers and event stream the test holds in its hands. */
export class SimulatedWindow {
  readonly server: SimulatedServer;
  clientId: string;
  readonly refused: string[] = [];
  isOnline = true;
  /** How many of the next answers get lost on the way back. */
  answersToLose = 0;
  store: EditorStore;
  #timers: (() => void)[] = [];
  #heard = 0;

  constructor(server: SimulatedServer, clientId: string) {
    this.server = server;
    this.clientId = clientId;
    this.store = this.#open(server.start, 0);
  }

  /** A reload: the page loads the newest state and takes up what was not acknowledged, else it is a new window. */
  reload(): void {
    const restored = this.store.listUnsaved();
    if (restored.pending.length === 0) this.clientId += "'";
    this.store.dispose();
    this.#timers = [];
    this.#heard = this.server.list.length;
    this.store = this.#open(this.server.space, this.server.list.length, restored);
  }

  /** Brings the next messages of the event stream; while the window is offline they are lost. */
  hear(count: number): void {
    const messages = this.server.list.slice(this.#heard, this.#heard + count);
    this.#heard += messages.length;
    if (this.isOnline) for (const message of messages) this.store.receive(message);
  }

  runTimers(): void {
    for (const run of this.#timers.splice(0)) run();
  }

  #open(space: AddressSpace, seq: number, restored?: EditorOptions["restored"]): EditorStore {
    return new EditorStore({
      space,
      seq,
      clientId: this.clientId,
      canEdit: true,
      transport: this.#makeTransport(),
      schedule: (run) => {
        this.#timers.push(run);
        return () => {
          this.#timers = this.#timers.filter((other) => other !== run);
        };
      },
      ...(restored ? { restored } : {}),
      onRefused: (list) => this.refused.push(...list.map((r) => r.pending.label)),
    });
  }

  #makeTransport(): SyncTransport {
    return {
      post: async (base, transactions) => {
        if (!this.isOnline) return { kind: "unreachable" };
        const outcome = this.server.post(this.clientId, base, structuredClone(transactions));
        if (this.answersToLose === 0) return outcome;
        this.answersToLose--;
        return { kind: "unreachable" };
      },
      listSince: async (seq) => (this.isOnline ? this.server.list.slice(seq) : undefined),
      lease: async () => (this.isOnline ? { block: { from: 5000, to: 5999 } } : undefined),
    };
  }
}

/** Lets every promise that is under way come to its end. */
export async function settle(): Promise<void> {
  for (let i = 0; i < 60; i++) await Promise.resolve();
}
