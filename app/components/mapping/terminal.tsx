/** A terminal of the strip: a screw head. Dashed while nothing is landed in it. */
export function Terminal({
  feed,
  isHere,
  id,
}: {
  feed: "fed" | "open" | "constant" | "suggested";
  isHere: boolean;
  id: string;
}) {
  const stroke = isHere
    ? "var(--copper)"
    : feed === "open"
      ? "var(--edge)"
      : feed === "suggested"
        ? "var(--hint)"
        : "var(--ink)";
  return (
    <svg
      data-terminal={id}
      viewBox="0 0 18 18"
      width={18}
      height={18}
      className="shrink-0"
      fill={isHere && feed === "fed" ? "var(--copper)" : "var(--leaf)"}
      stroke={stroke}
      strokeWidth={1.4}
      aria-hidden
    >
      <circle
        cx="9"
        cy="9"
        r="6.8"
        {...(feed === "open" || feed === "suggested" ? { strokeDasharray: "2.6 2" } : {})}
      />
      {feed === "open" || feed === "suggested" ? null : (
        <path
          d={feed === "constant" ? "M5.5 7.5h7M5.5 10.5h7" : "M4.8 13.2 13.2 4.8"}
          stroke={isHere && feed === "fed" ? "var(--leaf)" : stroke}
        />
      )}
    </svg>
  );
}
