import type { Severity } from "~/domain/core/result";

const colours: Record<Severity, string> = { error: "text-error", warning: "text-warning", hint: "text-hint" };
const nouns: Record<Severity, readonly [one: string, many: string]> = {
  error: ["error", "errors"],
  warning: ["warning", "warnings"],
  hint: ["hint", "hints"],
};

/** Error: filled octagon with a cross; warning: open triangle; hint: open circle with an i. */
export function FindingShape({ severity, size = 13 }: { severity: Severity; size?: number }) {
  return (
    <svg
      viewBox="0 0 16 16"
      width={size}
      height={size}
      className={`shrink-0 ${colours[severity]}`}
      fill="none"
      stroke="currentColor"
      aria-hidden
    >
      {severity === "error" ? (
        <>
          <path d="M5 1.5h6L14.5 5v6L11 14.5H5L1.5 11V5z" fill="currentColor" stroke="none" />
          <path d="m5.6 5.6 4.8 4.8m0-4.8-4.8 4.8" stroke="var(--leaf)" strokeWidth={1.7} />
        </>
      ) : severity === "warning" ? (
        <>
          <path d="M8 1.8 15 14H1z" strokeWidth={1.4} strokeLinejoin="round" />
          <path d="M8 6.2v3.6m0 1.8v.2" strokeWidth={1.6} strokeLinecap="round" />
        </>
      ) : (
        <>
          <circle cx="8" cy="8" r="6.3" strokeWidth={1.3} />
          <path d="M8 7.2v4m0-6.5v.2" strokeWidth={1.6} strokeLinecap="round" />
        </>
      )}
    </svg>
  );
}

export function findingWords(severity: Severity, count: number): string {
  return `${count} ${nouns[severity][count === 1 ? 0 : 1]}`;
}

/** Shape, then count. One badge a row: the worst severity wins, the count tells of more. */
export function FindingBadge({ severity, count, title }: { severity: Severity; count?: number; title?: string }) {
  const words = count === undefined ? nouns[severity][0] : findingWords(severity, count);
  return (
    <span
      role="img"
      aria-label={title ? `${words}: ${title}` : words}
      title={title}
      className={`inline-flex items-center gap-[3px] align-middle font-mono text-note leading-[14px] font-semibold whitespace-nowrap ${colours[severity]}`}
    >
      <FindingShape severity={severity} />
      {count === undefined ? null : count}
    </span>
  );
}

export type FindingTally = { readonly error: number; readonly warning: number; readonly hint: number };

/** Errors and warnings, hints only when they are alone; "none" with a tick otherwise. */
export function FindingTallyBadge({ tally, showNone }: { tally: FindingTally; showNone?: boolean }) {
  const parts = (["error", "warning"] as const).filter((severity) => tally[severity] > 0);
  if (parts.length > 0)
    return (
      <span className="inline-flex items-center gap-2">
        {parts.map((severity) => (
          <FindingBadge key={severity} severity={severity} count={tally[severity]} />
        ))}
      </span>
    );
  if (tally.hint > 0) return <FindingBadge severity="hint" count={tally.hint} />;
  if (!showNone) return null;
  return (
    <span className="inline-flex items-center gap-1 font-mono text-note text-ink-3">
      <svg viewBox="0 0 16 16" width={13} height={13} fill="none" stroke="currentColor" strokeWidth={1.5} aria-hidden>
        <path d="m3 8.5 3.3 3.3L13 4.7" />
      </svg>
      none
    </span>
  );
}
