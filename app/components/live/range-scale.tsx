import type { LiveRange } from "~/domain/live/live-node";
import { formatBound } from "~/domain/live/format-live";

const WIDTH = 480;
const STEPS = 20;

/** EURange drawn as a dimension over its scale, with the value as a mark; a value beyond it stands at the end, hollow. */
export function RangeScale({ range, unit, value, isStale }: { range: LiveRange; unit: string; value: number | null; isStale: boolean }) {
  const part = value === null ? null : (value - range.low) / (range.high - range.low);
  const isBeyond = part !== null && (part < 0 || part > 1);
  const x = part === null ? null : Math.min(1, Math.max(0, part)) * WIDTH;
  return (
    <figure className="mt-1.5" aria-label={`EURange ${formatBound(range.low)} to ${formatBound(range.high)} ${unit}`}>
      <svg viewBox={`-2 0 ${WIDTH + 4} 20`} className="block w-full overflow-visible" aria-hidden>
        <path d={`M0 8H${WIDTH}`} stroke="var(--ink)" strokeWidth={1.25} />
        {Array.from({ length: STEPS + 1 }, (_, i) => {
          const at = (i * WIDTH) / STEPS;
          const size = i % STEPS === 0 ? 6 : i % 5 === 0 ? 4.5 : 2.5;
          return <path key={i} d={`M${at} ${8 - size}V${i % STEPS === 0 ? 8 + size : 8}`} stroke="var(--ink)" strokeWidth={i % 5 === 0 ? 1.25 : 1} />;
        })}
        {x === null ? null : (
          <path
            d={`M${x} 9.5l-4.5 8.5h9z`}
            fill={isBeyond ? "var(--leaf)" : isStale ? "var(--stale)" : "var(--copper)"}
            stroke={isStale ? "var(--stale)" : "var(--copper)"}
            strokeWidth={1.2}
            className="transition-[d] duration-(--calm)"
          />
        )}
      </svg>
      <figcaption className="flex items-baseline justify-between font-mono text-note text-ink-3">
        <span>{formatBound(range.low)}</span>
        <span className="font-words">
          EURange{unit ? `, ${unit}` : ""}
          {isBeyond ? " · the value lies beyond it" : ""}
        </span>
        <span>{formatBound(range.high)}</span>
      </figcaption>
    </figure>
  );
}
