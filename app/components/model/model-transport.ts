/** The requests of the open model: transactions, leases of NodeIds, presence. What comes in is checked before it is used. */
import { z } from "zod";
import type { Problem } from "~/domain/core/result";
import { operationsSchema } from "~/domain/editing/operation-schema";
import type { Transaction } from "~/domain/editing/operation";
import type { OutgoingTransaction, PostOutcome, SyncTransport } from "~/editor/sync-transport";

const transactionSchema = z.object({
  seq: z.int(),
  base: z.int(),
  clientId: z.string(),
  clientSeq: z.int(),
  author: z.string(),
  at: z.string(),
  label: z.string(),
  operations: operationsSchema,
  inverse: z.array(z.unknown()),
});

const acceptedSchema = z.array(z.object({ clientSeq: z.int(), seq: z.int(), at: z.string() }));
const postedSchema = z.object({ head: z.int(), accepted: acceptedSchema });
const staleSchema = z.object({ head: z.int(), between: z.array(transactionSchema) });
const refusedSchema = z.object({ problems: z.array(z.looseObject({ code: z.string() })) });
const pageSchema = z.object({ head: z.int(), transactions: z.array(transactionSchema) });
const blockSchema = z.object({ from: z.int(), to: z.int() });

const TIMEOUT = 20_000;

export function parseTransaction(data: unknown): Transaction | undefined {
  const parsed = transactionSchema.safeParse(data);
  return parsed.success ? (parsed.data as unknown as Transaction) : undefined;
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
    if (answer.status === 200) return read(postedSchema, body, (value) => ({ kind: "accepted", ...value }));
    if (answer.status === 409) return read(staleSchema, body, (value) => ({ kind: "stale", ...value, between: value.between as unknown as Transaction[] }));
    if (answer.status === 422 || answer.status === 400) return read(refusedSchema, body, (value) => ({ kind: "refused", ...value, problems: value.problems as unknown as Problem[] }));
    if (answer.status === 401 || answer.status === 403 || answer.status === 404) return { kind: "forbidden", status: answer.status };
    return { kind: "unreachable" };
  }

  /** All transactions after `seq`; undefined while the server cannot be reached. */
  async listSince(seq: number): Promise<readonly Transaction[] | undefined> {
    const found: Transaction[] = [];
    for (let since = seq; ; ) {
      const answer = await fetch(`${this.#base}/transactions?since=${since}`, { signal: AbortSignal.timeout(TIMEOUT) }).catch(() => undefined);
      if (!answer?.ok) return undefined;
      const page = pageSchema.safeParse(await answer.json().catch(() => undefined));
      if (!page.success) return undefined;
      const transactions = page.data.transactions as unknown as Transaction[];
      found.push(...transactions);
      const last = transactions.at(-1)?.seq ?? page.data.head;
      if (transactions.length === 0 || last >= page.data.head) return found;
      since = last;
    }
  }

  /** A block of numeric ids of one's own; undefined while the server cannot be reached. */
  async lease(): Promise<{ readonly from: number; readonly to: number } | undefined> {
    const answer = await this.#send("lease", { clientId: this.clientId });
    if (!answer?.ok) return undefined;
    const block = blockSchema.safeParse(await answer.json().catch(() => undefined));
    return block.success ? block.data : undefined;
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

function read<T>(schema: z.ZodType<T>, body: unknown, make: (value: T) => PostOutcome): PostOutcome {
  const parsed = schema.safeParse(body);
  return parsed.success ? make(parsed.data) : { kind: "unreachable" };
}
