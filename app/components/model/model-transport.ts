/** The requests of the open model: transactions, leases of NodeIds, presence. What comes in is checked before it is used. */
import { isEmptyPage, isLease, isPosted, isRefused, parseWith } from "./read-answers";
import type { BlockFor } from "~/domain/editing/id-stock";
import type { Transaction } from "~/domain/editing/operation";
import type { IdLease, OutgoingTransaction, PostOutcome, SyncTransport } from "~/editor/sync-transport";

const TIMEOUT = 20_000;

/** Schemas of what others did are large; they come with the first such edit. */
const loadTransactionSchemas = () => import("./transaction-schemas");

export async function parseTransaction(data: unknown): Promise<Transaction | undefined> {
  const { transactionSchema } = await loadTransactionSchemas();
  return parseWith(transactionSchema, data) as unknown as Transaction | undefined;
}

export class ModelTransport implements SyncTransport {
  readonly #base: string;
  readonly clientId: string;

  constructor(modelId: string, clientId: string) {
    this.#base = `/models/${encodeURIComponent(modelId)}`;
    this.clientId = clientId;
  }

  async post(base: number, transactions: readonly OutgoingTransaction[]): Promise<PostOutcome> {
    const answer = await this.#send("transactions", { clientId: this.clientId, base, transactions });
    if (!answer) return { kind: "unreachable" };
    const body: unknown = await answer.json().catch(() => undefined);
    if (answer.status === 200) return isPosted(body) ? { kind: "accepted", ...body } : { kind: "unreachable" };
    if (answer.status === 409) {
      const { staleSchema } = await loadTransactionSchemas();
      const stale = parseWith(staleSchema, body);
      return stale ? { kind: "stale", ...stale, between: stale.between as unknown as Transaction[] } : { kind: "unreachable" };
    }
    if (answer.status === 422 || answer.status === 400) return isRefused(body) ? { kind: "refused", ...body } : { kind: "unreachable" };
    if (answer.status === 401 || answer.status === 403 || answer.status === 404) return { kind: "forbidden", status: answer.status };
    return { kind: "unreachable" };
  }

  /** All transactions after `seq`; undefined while the server cannot be reached. */
  async listSince(seq: number): Promise<readonly Transaction[] | undefined> {
    const found: Transaction[] = [];
    for (let since = seq; ; ) {
      const answer = await fetch(`${this.#base}/transactions?since=${since}`, { signal: AbortSignal.timeout(TIMEOUT) }).catch(() => undefined);
      if (!answer?.ok) return undefined;
      const body: unknown = await answer.json().catch(() => undefined);
      if (isEmptyPage(body)) return found;
      const { pageSchema } = await loadTransactionSchemas();
      const page = parseWith(pageSchema, body);
      if (!page) return undefined;
      const transactions = page.transactions as unknown as Transaction[];
      found.push(...transactions);
      const last = transactions.at(-1)?.seq ?? page.head;
      if (transactions.length === 0 || last >= page.head) return found;
      since = last;
    }
  }

  /** A block of numeric ids of one's own; undefined while the server cannot be reached. */
  async lease(nodeClass: BlockFor): Promise<IdLease | undefined> {
    const answer = await this.#send("lease", { clientId: this.clientId, ...(nodeClass ? { nodeClass } : {}) });
    if (!answer?.ok) return undefined;
    const lease: unknown = await answer.json().catch(() => undefined);
    if (!isLease(lease)) return undefined;
    return lease.block && nodeClass ? { ...lease, block: { ...lease.block, nodeClass } } : lease;
  }

  async tellPresence(place: string, selection: readonly string[]): Promise<void> {
    await this.#send("presence", { clientId: this.clientId, place, selection: selection.slice(0, 100) });
  }

  async #send(path: string, body: unknown): Promise<Response | undefined> {
    return fetch(`${this.#base}/${path}`, {
      method: "POST",
      headers: { "content-type": "application/json" },
      body: JSON.stringify(body),
      signal: AbortSignal.timeout(TIMEOUT),
    }).catch(() => undefined);
  }
}
