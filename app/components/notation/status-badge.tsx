import type { ReactNode } from "react";

/** What a value, a connection or a process is like now. `stale`: the stream stopped, or it is not connected. */
export type Status = "good" | "uncertain" | "bad" | "stale";

const colours: Record<Status, string> = {
  good: "text-good",
  uncertain: "text-uncertain",
  bad: "text-bad",
  stale: "text-stale",
};

/** Full disc, half disc, open disc struck through, dashed disc. */
export function StatusShape({ status, size = 11 }: { status: Status; size?: number }) {
  return (
    <svg
      viewBox="0 0 16 16"
      width={size}
      height={size}
      className={`shrink-0 ${colours[status]}`}
      fill="none"
      stroke="currentColor"
      aria-hidden
    >
      {status === "good" ? <circle cx="8" cy="8" r="6.5" fill="currentColor" stroke="none" /> : null}
      {status === "uncertain" ? (
        <>
          <circle cx="8" cy="8" r="6" strokeWidth={1.6} />
          <path d="M8 2a6 6 0 0 1 0 12z" fill="currentColor" stroke="none" />
        </>
      ) : null}
      {status === "bad" ? (
        <>
          <circle cx="8" cy="8" r="6" strokeWidth={1.8} />
          <path d="m4 12 8-8" strokeWidth={1.8} />
        </>
      ) : null}
      {status === "stale" ? <circle cx="8" cy="8" r="6" strokeWidth={1.6} strokeDasharray="3 2.6" /> : null}
    </svg>
  );
}

export function StatusBadge({
  status,
  children,
  quiet,
}: {
  status: Status;
  children: ReactNode;
  /** The word in ink, only the shape coloured. */ quiet?: boolean;
}) {
  return (
    <span
      className={`inline-flex items-center gap-[5px] align-middle text-small whitespace-nowrap ${quiet ? "text-ink-2" : colours[status]}`}
    >
      <StatusShape status={status} />
      {children}
    </span>
  );
}
