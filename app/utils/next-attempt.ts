const MINUTE_MS = 60_000;
const WAITS_MINUTES = [0.25, 1, 5, 15] as const;
const LAST_WAIT_MINUTES = 60;
/** A little more than a week of hourly attempts: longer than any holiday of a mail server. */
const MAX_ATTEMPTS = 200;

/** When to try again after so many attempts that failed; undefined when it is time to give up. */
export function nextAttempt(attempts: number, now: Date): Date | undefined {
  if (attempts >= MAX_ATTEMPTS) return undefined;
  const minutes = WAITS_MINUTES[attempts - 1] ?? LAST_WAIT_MINUTES;
  return new Date(now.getTime() + minutes * MINUTE_MS);
}
