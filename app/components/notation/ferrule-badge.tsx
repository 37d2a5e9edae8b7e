/** `fed` by a source, `open` (nothing feeds it), `constant`, or `suggested`. */
export type Feed = "fed" | "open" | "constant" | "suggested";

const words: Record<Feed, string> = {
  fed: "fed by a source",
  open: "no source yet",
  constant: "constant",
  suggested: "suggestion",
};
const colours: Record<Feed, string> = {
  fed: "text-copper",
  open: "text-ink-3",
  constant: "text-ink-3",
  suggested: "text-hint",
};
const sleeve = "M5 2.5 8.5 4.6h7v4.8h-7L5 11.5z";

/** A wire with its sleeve: filled, dashed, or with two bars. */
export function FerruleBadge({ feed, width = 20, title }: { feed: Feed; width?: number; title?: string }) {
  return (
    <svg
      viewBox="0 0 20 14"
      width={width}
      height={(width * 14) / 20}
      role="img"
      aria-label={title ?? words[feed]}
      className={`shrink-0 ${colours[feed]}`}
      fill="none"
      stroke="currentColor"
      strokeWidth={1.2}
      strokeLinejoin="round"
    >
      {feed === "constant" ? null : <path d="M0 7h5" />}
      {feed === "fed" ? <path d="M15.5 7H20" /> : null}
      <path
        d={sleeve}
        {...(feed === "fed" ? { fill: "currentColor" } : {})}
        {...(feed === "open" || feed === "suggested" ? { strokeDasharray: "2 1.6" } : {})}
      />
      {feed === "constant" ? <path d="M9.5 6.1h4M9.5 7.9h4" /> : null}
    </svg>
  );
}

/** The mark of the product: a ferrule on its wire. */
export function FerruleMark({ width = 30 }: { width?: number }) {
  return (
    <svg
      viewBox="0 0 30 14"
      width={width}
      height={(width * 14) / 30}
      fill="none"
      stroke="var(--ink)"
      strokeWidth={1.5}
      strokeLinejoin="round"
      aria-hidden
    >
      <path d="M0 7h7M24 7h6" />
      <path d="M7 1.5 13 4.3h11v5.4H13L7 12.5z" fill="var(--copper)" stroke="var(--copper)" />
    </svg>
  );
}
