/**
 * Slows down guessing of passwords: failures are counted by account and by address in a sliding window. A success
 * clears the account's count. Kept in memory and bounded; a restart forgives.
 */
import { singleton } from "../utils/singleton.server";

const WINDOW_MS = 10 * 60_000;
const LIMITS = { account: 8, address: 40 } as const;
const MAX_KEYS = 20_000;

type Limiter = { readonly failures: Map<string, number[]> };

function getLimiter(): Limiter {
  return singleton("sign-in-limiter", () => ({ failures: new Map<string, number[]>() }));
}

function recentFailures(key: string, now: number): number[] {
  return (getLimiter().failures.get(key) ?? []).filter((at) => now - at < WINDOW_MS);
}

/** Seconds to wait before another attempt is looked at; 0 when one may be made now. */
export function secondsUntilAllowed(email: string, address: string, now = Date.now()): number {
  const waits = keysOf(email, address).map(([key, limit]) => {
    const failures = recentFailures(key, now);
    const oldest = failures[failures.length - limit];
    return oldest === undefined ? 0 : Math.ceil((oldest + WINDOW_MS - now) / 1000);
  });
  return Math.max(...waits);
}

export function noteFailure(email: string, address: string, now = Date.now()): void {
  const { failures } = getLimiter();
  for (const [key] of keysOf(email, address)) {
    const recent = recentFailures(key, now);
    failures.delete(key);
    failures.set(key, [...recent, now].slice(-LIMITS.address));
  }
  while (failures.size > MAX_KEYS) {
    const oldest = failures.keys().next().value;
    if (oldest === undefined) break;
    failures.delete(oldest);
  }
}

/** Forgives the account all, and the address the one that was counted before the password was looked at. */
export function noteSuccess(email: string, address: string): void {
  const { failures } = getLimiter();
  failures.delete(accountKey(email));
  const key = `address:${address}`;
  failures.set(key, (failures.get(key) ?? []).slice(0, -1));
}

function accountKey(email: string): string {
  return `account:${email.trim().toLowerCase().slice(0, 320)}`;
}

function keysOf(email: string, address: string): [key: string, limit: number][] {
  return [
    [accountKey(email), LIMITS.account],
    [`address:${address}`, LIMITS.address],
  ];
}
