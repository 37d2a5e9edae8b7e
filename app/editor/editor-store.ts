/**
 * The working state of a model in one window, and its way to the server.
 *
 * Two states are kept. *Confirmed* is what the server has said: the pack, then every transaction in the order of its
 * sequence numbers, own and foreign alike. *Shown* is confirmed with the pending edits of this window on top; an edit is
 * applied there at once and sent in the background, one request at a time. A foreign transaction moves the confirmed
 * state on and the pending edits are rebased; one that cannot be kept leaves the queue and is told with the edit that it
 * met. The server answers the same way as the rebase here, so what passes here passes there. While the server cannot be
 * reached edits queue; a resend carries the same numbers, so that nothing is applied twice.
 *
 * The store knows no React, network or clock: requests go through SyncTransport, waiting through Scheduler.
 */
import type { AddressSpace } from "../domain/address-space/address-space";
import { fail, ok, type Problem, type Result } from "../domain/core/result";
import type { NodeIdAllocator } from "../domain/editing/allocate-node-id";
import { applyOperations } from "../domain/editing/apply-operation";
import {
  EMPTY_HISTORY,
  forget,
  recordForeign,
  recordOwn,
  redo,
  undo,
  type History,
  type HistoryStep,
} from "../domain/editing/history";
import { IdStock } from "../domain/editing/id-stock";
import { applyWithInverse, type Applied } from "../domain/editing/invert-operation";
import type { Operation, Transaction } from "../domain/editing/operation";
import { rebase, type RefusedEdit } from "../domain/editing/rebase";
import type { EditorOptions, EditorState, SyncState, UnsavedEdits } from "./editor-state";
import type { OutgoingTransaction, PostOutcome } from "./sync-transport";

const MOST_SENT = 100;
const RETRY_DELAYS = [500, 1000, 2000, 4000, 8000];
/** Fewer ids than these in stock, and the next block is leased. */
const LEASE_BELOW = 400;

export class EditorStore {
  readonly clientId: string;
  readonly allocator: NodeIdAllocator;
  readonly #options: EditorOptions;
  readonly #ids: IdStock;
  readonly #listeners = new Set<() => void>();
  /** Foreign transactions that came before the one they follow. */
  readonly #early = new Map<number, Transaction>();
  #confirmed: AddressSpace;
  #seq: number;
  #shown: AddressSpace;
  #pending: readonly OutgoingTransaction[] = [];
  #history: History = EMPTY_HISTORY;
  #nextClientSeq = 1;
  #savedAt: string | undefined;
  #sync: SyncState = "saved";
  #state: EditorState;
  #isSending = false;
  #isCatchingUp = false;
  #isLeasing = false;
  #isDisposed = false;
  /** Transactions are known to be missing; nothing is sent until they are here. */
  #isBehind = false;
  #isSettling = false;
  #unsettled: UnsavedEdits | undefined;
  #attempt = 0;
  #cancelRetry: (() => void) | undefined;

  constructor(options: EditorOptions) {
    this.#options = options;
    this.clientId = options.clientId;
    this.#confirmed = options.space;
    this.#shown = options.space;
    this.#seq = options.seq;
    this.#ids = new IdStock(() => this.#shown, options.restored?.blocks ?? []);
    this.allocator = { allocate: (nodeClass, place) => this.#allocate(nodeClass, place) };
    this.#state = this.#makeState();
    if (options.canEdit && options.restored && options.restored.pending.length > 0)
      this.#startRestoring(options.restored);
    void this.#lease();
  }

  readonly getState = (): EditorState => this.#state;

  readonly subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };

  /** What a reload of the page needs to go on: pending edits and unused ids. */
  listUnsaved(): UnsavedEdits {
    const earlier = this.#unsettled;
    return {
      pending: [...(earlier?.pending ?? []), ...this.#pending],
      blocks: this.#ids.listBlocks(),
      base: earlier?.base ?? this.#seq,
    };
  }

  /** Applies an edit at once and sends it; answers the problems where it cannot be applied. */
  dispatch(label: string, operations: readonly Operation[]): Result<AddressSpace> {
    const applied = applyWithInverse(this.#shown, operations);
    if (!applied.ok) return applied;
    const clientSeq = this.#enqueue(label, operations, applied.value);
    this.#history = recordOwn(this.#history, { id: clientSeq, label, operations, inverse: applied.value.inverse });
    this.#changed();
    return ok(this.#shown);
  }

  /** Takes the newest own edit back, as a new transaction. */
  undo(): Result<AddressSpace> {
    return this.#step(undo(this.#history, this.#shown, this.#nextClientSeq));
  }

  redo(): Result<AddressSpace> {
    return this.#step(redo(this.#history, this.#shown, this.#nextClientSeq));
  }

  /** A transaction of the event stream: an acknowledgement of an own one, or what somebody else did. */
  receive(transaction: Transaction): void {
    if (transaction.seq <= this.#seq) return;
    if (transaction.seq > this.#seq + 1) {
      this.#early.set(transaction.seq, transaction);
      this.#isBehind = true;
      void this.catchUp();
      return;
    }
    this.#advance(transaction);
    for (let next = this.#early.get(this.#seq + 1); next; next = this.#early.get(this.#seq + 1)) this.#advance(next);
    for (const seq of this.#early.keys()) if (seq <= this.#seq) this.#early.delete(seq);
    this.#changed();
  }

  /** Asks for what was missed while the stream was away, then sends what is pending. */
  async catchUp(): Promise<void> {
    if (this.#isCatchingUp || this.#isDisposed) return;
    if (this.#unsettled) return this.#settleRestored();
    this.#isCatchingUp = true;
    const missed = await this.#options.transport.listSince(this.#seq);
    this.#isCatchingUp = false;
    if (this.#isDisposed) return;
    if (!missed) {
      this.#goOffline();
      return;
    }
    this.#isBehind = false;
    for (const transaction of missed) this.receive(transaction);
    this.#send();
  }

  dispose(): void {
    this.#isDisposed = true;
    this.#cancelRetry?.();
    this.#listeners.clear();
  }

  #allocate(...[nodeClass, place]: Parameters<NodeIdAllocator["allocate"]>): ReturnType<NodeIdAllocator["allocate"]> {
    const allocated = this.#ids.allocate(nodeClass, place);
    void this.#lease();
    return allocated;
  }

  /** Keeps some ids in stock, since an edit cannot wait for the network. */
  async #lease(): Promise<void> {
    if (this.#isLeasing || this.#isDisposed || !this.#options.canEdit) return;
    for (let wanted = this.#ids.findWanted(LEASE_BELOW); wanted; wanted = this.#ids.findWanted(LEASE_BELOW)) {
      this.#isLeasing = true;
      const lease = await this.#options.transport.lease(wanted.for);
      this.#isLeasing = false;
      if (this.#isDisposed) return;
      if (!lease) {
        this.#options.schedule(() => void this.#lease(), RETRY_DELAYS[2] as number);
        return;
      }
      if (lease.given) this.#ids.addGiven(lease.given);
      if (!lease.block) this.#ids.markUsedUp(wanted.for);
      else if (!this.#ids.addBlock(lease.block)) {
        // The server knows another choice of NodeIds than this window; one of them will hear of it.
        this.#options.schedule(() => void this.#lease(), RETRY_DELAYS[2] as number);
        return;
      }
    }
  }

  /**
   * Some of the restored edits may have reached the server, and others may have come before the rest. Only the list of
   * transactions since they were made tells; until it is here they wait.
   */
  #startRestoring(unsettled: UnsavedEdits): void {
    this.#nextClientSeq = Math.max(...unsettled.pending.map((edit) => edit.clientSeq)) + 1;
    this.#unsettled = unsettled;
    this.#changed();
    void this.#settleRestored();
  }

  async #settleRestored(): Promise<void> {
    const unsettled = this.#unsettled;
    if (!unsettled || this.#isSettling) return;
    this.#isSettling = true;
    const since = await this.#options.transport.listSince(unsettled.base);
    this.#isSettling = false;
    if (this.#isDisposed) return;
    if (!since) {
      this.#goOffline();
      return;
    }
    const isOwn = (t: Transaction): boolean => t.clientId === this.clientId;
    const stored = new Set(since.filter(isOwn).map((t) => t.clientSeq));
    const between = since.filter((t) => !isOwn(t) && t.seq <= this.#seq);
    const rest = unsettled.pending.filter((edit) => !stored.has(edit.clientSeq));
    this.#unsettled = undefined;
    // What this page has edited meanwhile comes after what it left behind.
    const restored = rebase(this.#confirmed, between, rest);
    this.#pending = [...restored.kept.map((entry) => entry.pending), ...this.#pending];
    if (restored.refused.length > 0) this.#drop(restored.refused);
    this.#rebase([]);
    for (const transaction of since) this.receive(transaction);
    this.#changed();
    this.#send();
  }

  #enqueue(label: string, operations: readonly Operation[], applied: Applied): number {
    const clientSeq = this.#nextClientSeq++;
    this.#shown = applied.space;
    this.#ids.record(operations);
    this.#pending = [...this.#pending, { clientSeq, label, operations }];
    // Edits of one turn go in one request.
    queueMicrotask(() => this.#send());
    return clientSeq;
  }

  #step({ history, outcome }: HistoryStep): Result<AddressSpace> {
    this.#history = history;
    if (outcome.ok) this.#enqueue(outcome.value.label, outcome.value.operations, outcome.value);
    this.#changed();
    return outcome.ok ? ok(this.#shown) : fail(...outcome.problems);
  }

  /** The next transaction of the confirmed state. */
  #advance(transaction: Transaction): void {
    const applied = applyOperations(this.#confirmed, transaction.operations);
    // The server accepted it on the same state; if it cannot be applied here this window has gone wrong and must reload.
    if (!applied.ok)
      throw new RangeError(
        `Transaction ${transaction.seq} does not fit: ${applied.problems.map((p) => p.code).join(", ")}`,
      );
    this.#confirmed = applied.value;
    this.#seq = transaction.seq;
    this.#ids.record(transaction.operations);
    // Another choice of NodeIds needs other blocks.
    if (transaction.operations.some((o) => o.kind === "setHeader" && o.field === "idPolicy")) void this.#lease();
    if (transaction.clientId === this.clientId && this.#acknowledge(transaction.clientSeq, transaction.at)) return;
    this.#history = recordForeign(this.#history, transaction);
    this.#rebase([transaction]);
    this.#options.onForeign?.(transaction);
  }

  /** Takes an own edit out of the queue; the shown state has it already. False when it is not pending. */
  #acknowledge(clientSeq: number, at: string): boolean {
    const index = this.#pending.findIndex((edit) => edit.clientSeq === clientSeq);
    if (index < 0) return false;
    this.#pending = this.#pending.filter((_, i) => i !== index);
    this.#savedAt = at;
    if (this.#pending.length === 0) this.#shown = this.#confirmed;
    return true;
  }

  #rebase(between: readonly Transaction[]): void {
    const { space, kept, refused } = rebase(this.#confirmed, between, this.#pending);
    this.#shown = space;
    this.#pending = kept.map((entry) => entry.pending);
    if (refused.length > 0) this.#drop(refused);
  }

  #drop(refused: readonly RefusedEdit<OutgoingTransaction>[]): void {
    for (const { pending } of refused) this.#history = forget(this.#history, pending.clientSeq);
    this.#options.onRefused?.(refused);
  }

  #send(): void {
    const mustWait = this.#isSending || this.#isCatchingUp || this.#isBehind || this.#unsettled !== undefined;
    if (mustWait || this.#isDisposed || this.#pending.length === 0 || this.#sync === "blocked") return;
    this.#isSending = true;
    this.#cancelRetry?.();
    this.#cancelRetry = undefined;
    const batch = this.#pending.slice(0, MOST_SENT);
    void this.#options.transport.post(this.#seq, batch).then((outcome) => {
      this.#isSending = false;
      if (!this.#isDisposed) this.#settle(batch, outcome);
    });
  }

  #settle(batch: readonly OutgoingTransaction[], outcome: PostOutcome): void {
    if (outcome.kind !== "unreachable") this.#attempt = 0;
    const [before, seq] = [this.#pending, this.#seq];
    switch (outcome.kind) {
      case "accepted":
        this.#sync = "saving";
        this.#confirm(batch, outcome);
        break;
      case "stale":
        this.#sync = "saving";
        for (const transaction of outcome.between) this.receive(transaction);
        break;
      case "refused":
        this.#refuse(batch, outcome.problems);
        break;
      case "forbidden":
        this.#sync = "blocked";
        break;
      case "unreachable":
        this.#goOffline();
        return;
    }
    this.#changed();
    // An answer that moved nothing is not asked for again at once.
    if (this.#pending === before && this.#seq === seq && this.#sync !== "blocked") this.#retryLater();
    else this.#send();
  }

  /** Own transactions in the order of their numbers; a gap means that others came between, and these are asked for. */
  #confirm(batch: readonly OutgoingTransaction[], outcome: Extract<PostOutcome, { kind: "accepted" }>): void {
    const ordered = [...outcome.accepted].sort((a, b) => a.seq - b.seq);
    for (const { clientSeq, seq, at } of ordered) {
      const edit = batch.find((entry) => entry.clientSeq === clientSeq);
      if (!edit || seq <= this.#seq) continue;
      if (seq > this.#seq + 1) {
        this.#isBehind = true;
        void this.catchUp();
        return;
      }
      this.#advance({
        seq,
        base: seq - 1,
        clientId: this.clientId,
        clientSeq,
        author: "",
        at,
        label: edit.label,
        operations: edit.operations,
        inverse: [],
      });
    }
  }

  /** The transaction that the server names goes, and what builds on it; without a name it is the first. */
  #refuse(batch: readonly OutgoingTransaction[], problems: readonly Problem[]): void {
    const named = problems.map((found) => found.data?.clientSeq).find((value) => typeof value === "number");
    const culprit = batch.find((edit) => edit.clientSeq === named) ?? batch[0];
    if (!culprit) return;
    this.#pending = this.#pending.filter((edit) => edit.clientSeq !== culprit.clientSeq);
    this.#rebase([]);
    this.#drop([{ pending: culprit, problems }]);
  }

  #goOffline(): void {
    this.#sync = "offline";
    this.#retryLater();
    this.#changed();
  }

  #retryLater(): void {
    this.#cancelRetry?.();
    const delay = RETRY_DELAYS[Math.min(this.#attempt++, RETRY_DELAYS.length - 1)] as number;
    this.#cancelRetry = this.#options.schedule(() => {
      this.#cancelRetry = undefined;
      if (this.#isBehind || this.#unsettled) void this.catchUp();
      else this.#send();
    }, delay);
  }

  #makeState(): EditorState {
    return {
      space: this.#shown,
      seq: this.#seq,
      pendingCount: this.#countPending(),
      sync: this.#sync,
      savedAt: this.#savedAt,
      undoLabel: this.#history.undoable.at(-1)?.label,
      redoLabel: this.#history.redoable.at(-1)?.label,
    };
  }

  #countPending(): number {
    return this.#pending.length + (this.#unsettled?.pending.length ?? 0);
  }

  #changed(): void {
    const isDone = this.#countPending() === 0;
    if (this.#sync !== "offline" && this.#sync !== "blocked") this.#sync = isDone ? "saved" : "saving";
    if (this.#sync === "offline" && isDone && !this.#isBehind) this.#sync = "saved";
    this.#state = this.#makeState();
    for (const listener of [...this.#listeners]) listener();
  }
}
