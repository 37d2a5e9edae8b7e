export type Difference = "added" | "removed" | "changed";
/** What a change means for readers: breaking, additive, neutral. */
export type Rating = "breaking" | "additive" | "neutral";

const differenceColours: Record<Difference, string> = {
  added: "text-added",
  removed: "text-removed",
  changed: "text-changed",
};
const ratingColours: Record<Rating, string> = {
  breaking: "text-removed",
  additive: "text-added",
  neutral: "text-ink-3",
};

/** Box with a plus, filled box with a minus, dashed box with a wave. */
export function DifferenceBadge({ difference, size = 13 }: { difference: Difference; size?: number }) {
  return (
    <svg
      viewBox="0 0 16 16"
      width={size}
      height={size}
      role="img"
      aria-label={difference}
      className={`shrink-0 ${differenceColours[difference]}`}
      fill="none"
      stroke="currentColor"
    >
      {difference === "removed" ? (
        <>
          <rect x="1.5" y="1.5" width="13" height="13" fill="currentColor" stroke="none" />
          <path d="M4.5 8h7" stroke="var(--leaf)" strokeWidth={1.9} />
        </>
      ) : (
        <rect
          x="1.5"
          y="1.5"
          width="13"
          height="13"
          strokeWidth={1.2}
          {...(difference === "changed" ? { strokeDasharray: "2.6 1.9" } : {})}
        />
      )}
      {difference === "added" ? <path d="M8 4.5v7M4.5 8h7" strokeWidth={1.7} /> : null}
      {difference === "changed" ? <path d="M4.3 9.5C6 5.9 7.7 11.5 11.2 6.9" strokeWidth={1.6} /> : null}
    </svg>
  );
}

/** Broken line, plus, two bars; always with its word. */
export function RatingBadge({ rating, count }: { rating: Rating; count?: number }) {
  const shapes: Record<Rating, string> = {
    breaking: "M1 8h5.5M9.5 8H15M5 12.5l2-9M9 12.5l2-9",
    additive: "M8 2.5v11M2.5 8h11",
    neutral: "M2.5 5.7h11M2.5 10.3h11",
  };
  return (
    <span
      className={`inline-flex items-center gap-[5px] align-middle text-small font-semibold ${ratingColours[rating]}`}
    >
      <svg viewBox="0 0 16 16" width={14} height={14} fill="none" stroke="currentColor" strokeWidth={1.7} aria-hidden>
        <path d={shapes[rating]} />
      </svg>
      {rating}
      {count === undefined ? null : <span className="font-mono font-normal">{count}</span>}
    </span>
  );
}
