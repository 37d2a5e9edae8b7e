/**
 * The small answers of the server, checked by hand: the schemas of operations, which are large, are then needed only where
 * operations of others come in.
 */
import type { Problem } from "~/domain/core/result";
import type { AcceptedTransaction, IdLease } from "~/editor/sync-transport";

type Members = Readonly<Record<string, unknown>>;

const toMembers = (value: unknown): Members => (typeof value === "object" && value !== null ? (value as Members) : {});
const isCount = (value: unknown): value is number => Number.isSafeInteger(value);

export function isPosted(body: unknown): body is { head: number; accepted: readonly AcceptedTransaction[] } {
  const { head, accepted } = toMembers(body);
  return isCount(head) && Array.isArray(accepted) && accepted.every(isAccepted);
}

function isAccepted(value: unknown): boolean {
  const { clientSeq, seq, at } = toMembers(value);
  return isCount(clientSeq) && isCount(seq) && typeof at === "string";
}

export function isRefused(body: unknown): body is { problems: readonly Problem[] } {
  const { problems } = toMembers(body);
  return Array.isArray(problems) && problems.every((found) => typeof toMembers(found).code === "string");
}

export function isLease(body: unknown): body is IdLease {
  const { block, given } = toMembers(body);
  const { from, to } = toMembers(block);
  const isBlock = block === undefined || (isCount(from) && isCount(to));
  return isBlock && (given === undefined || (Array.isArray(given) && given.every((id) => typeof id === "string")));
}

/** Nothing happened meanwhile, which is the usual answer when a page opens. */
export function isEmptyPage(body: unknown): boolean {
  const { head, transactions } = toMembers(body);
  return isCount(head) && Array.isArray(transactions) && transactions.length === 0;
}

type Schema<T> = { safeParse(value: unknown): { readonly success: true; readonly data: T } | { readonly success: false } };

/** The value after a schema that was loaded; undefined where it does not fit. */
export function parseWith<T>(schema: Schema<T>, value: unknown): T | undefined {
  const parsed = schema.safeParse(value);
  return parsed.success ? parsed.data : undefined;
}
