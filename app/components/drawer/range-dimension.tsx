import type { Range } from "~/domain/nodeset/values/standard-values";
import { formatNumber } from "../model/analog-facts";

const WIDTH = 320;
const LEFT = 10;
const RIGHT = WIDTH - 10;

/** EURange as a dimension over an axis: InstrumentRange where there is one, else a rounded span around it. */
export function RangeDimension({ range, instrument }: { range: Range; instrument: Range | undefined }) {
  const axis = instrument ?? widen(range);
  const span = axis.high - axis.low;
  if (!Number.isFinite(span) || span <= 0 || range.high <= range.low) return null;
  const toX = (value: number): number =>
    LEFT + ((Math.min(Math.max(value, axis.low), axis.high) - axis.low) / span) * (RIGHT - LEFT);
  const low = toX(range.low);
  const high = toX(range.high);
  const middle = (low + high) / 2;
  const title = `EURange ${formatNumber(range.low)} … ${formatNumber(range.high)}`;
  return (
    <svg className="dimension" viewBox={`0 0 ${WIDTH} 60`} width="100%" height="60" role="img" aria-label={title}>
      <path className="dimension-axis" d={`M${LEFT} 30H${RIGHT}`} />
      {Array.from({ length: 21 }, (_, i) => {
        const x = LEFT + ((RIGHT - LEFT) * i) / 20;
        return (
          <path key={i} className="dimension-axis" strokeWidth="1" d={i % 5 === 0 ? `M${x} 26v8` : `M${x} 30v4`} />
        );
      })}
      <rect className="dimension-bar" x={low} y="26.5" width={Math.max(2, high - low)} height="7" />
      <path className="dimension-line" d={`M${low} 10v26M${high} 10v26M${low} 14H${high}`} />
      <path d={`M${low} 14l8.500-2.300v4.600zM${high} 14l-8.500-2.300v4.600z`} fill="var(--copper)" />
      <Caption x={middle} y={18} text={title} />
      <text x={LEFT} y="56">
        {formatNumber(axis.low)}
      </text>
      <text x={RIGHT} y="56" textAnchor="end">
        {formatNumber(axis.high)}
      </text>
      {instrument ? (
        <text x={WIDTH / 2} y="56" textAnchor="middle">
          InstrumentRange
        </text>
      ) : null}
    </svg>
  );
}

function Caption({ x, y, text }: { x: number; y: number; text: string }) {
  const half = (text.length * 6.7) / 2 + 6;
  const at = Math.min(Math.max(x, half), WIDTH - half);
  return (
    <>
      <rect x={at - half} y={y - 11} width={half * 2} height="14" fill="var(--bench)" />
      <text x={at} y={y} textAnchor="middle">
        {text}
      </text>
    </>
  );
}

/** A span with a little room on both sides, ending on round numbers. */
function widen({ low, high }: Range): Range {
  const span = high - low;
  if (!(span > 0) || !Number.isFinite(span)) return { low, high };
  const step = 10 ** Math.floor(Math.log10(span)) / 5;
  return { low: Math.floor((low - span * 0.12) / step) * step, high: Math.ceil((high + span * 0.12) / step) * step };
}
