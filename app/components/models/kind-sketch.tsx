/** One type with its shadow, or its instances in a row. */
export function KindSketch({ kind, width = 56 }: { kind: "types" | "machines"; width?: number }) {
  return (
    <svg
      viewBox="0 0 56 40"
      width={width}
      height={(width * 40) / 56}
      fill="var(--leaf)"
      stroke="var(--ink)"
      strokeWidth={1.4}
      aria-hidden
      className="shrink-0"
    >
      {kind === "types" ? (
        <>
          <path d="M12 36.500h40V10" fill="none" stroke="var(--shade)" strokeWidth="5" />
          <rect x="6" y="4" width="43" height="30" />
          <path d="M6 13h43M12 20h20M12 27h14" />
        </>
      ) : (
        <>
          <rect x="3" y="10" width="14" height="24" />
          <rect x="21" y="10" width="14" height="24" />
          <rect x="39" y="10" width="14" height="24" strokeDasharray="3 2.5" />
          <path d="M3 16h14M21 16h14M10 10V4h36v6M28 4v6" fill="none" />
        </>
      )}
    </svg>
  );
}
