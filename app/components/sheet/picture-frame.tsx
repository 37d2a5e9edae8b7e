/** Frame, zones and title block of a sheet's picture. */
import { formatZoneColumn, formatZoneRow, ZONE_HEIGHT, ZONE_WIDTH, type Rect } from "./sheet-geometry";

export type TitleFact = { readonly label: string; readonly value: string; readonly width: number; readonly isMono?: boolean };

export const TITLE_HEIGHT = 56;
export const MONO = "'JetBrains Mono Variable', 'JetBrains Mono', 'DejaVu Sans Mono', monospace";
const EDGE = 20;
const BAND = 14;

export function PictureFrame({ box, title }: { box: Rect; title: readonly TitleFact[] }) {
  const outer = { x: box.x + EDGE - BAND, y: box.y + EDGE - BAND, width: box.width - 2 * (EDGE - BAND), height: box.height - 2 * (EDGE - BAND) };
  const inner = { x: box.x + EDGE, y: box.y + EDGE, width: box.width - 2 * EDGE, height: box.height - 2 * EDGE };
  const columns = Math.max(1, Math.round(inner.width / ZONE_WIDTH));
  const rows = Math.max(1, Math.round(inner.height / ZONE_HEIGHT));
  return (
    <g>
      <rect {...outer} fill="none" stroke="var(--edge)" />
      <rect {...inner} fill="none" stroke="var(--ink)" strokeWidth="1.5" />
      {Array.from({ length: columns }, (_, index) => {
        const at = inner.x + ((index + 0.5) * inner.width) / columns;
        return [outer.y + 11, outer.y + outer.height - 3.5].map((y) => <Zone key={`${index} ${y}`} x={at} y={y} text={formatZoneColumn(index)} />);
      })}
      {Array.from({ length: rows }, (_, index) => {
        const at = inner.y + ((index + 0.5) * inner.height) / rows + 4;
        return [outer.x + 7, outer.x + outer.width - 7].map((x) => <Zone key={`${index} ${x}`} x={x} y={at} text={formatZoneRow(index)} />);
      })}
      <TitleBlockPicture inner={inner} title={title} />
    </g>
  );
}

function Zone({ x, y, text }: { x: number; y: number; text: string }) {
  return (
    <text x={x} y={y} textAnchor="middle" fontSize="10.5" fontFamily={MONO} fill="var(--ink-3)">
      {text}
    </text>
  );
}

/** In the drawing's lower right corner. */
function TitleBlockPicture({ inner, title }: { inner: Rect; title: readonly TitleFact[] }) {
  const width = title.reduce((sum, fact) => sum + fact.width, 0);
  const bottom = inner.y + inner.height;
  let x = inner.x + inner.width - width;
  const cells = title.map((fact) => {
    const at = x;
    x += fact.width;
    return { ...fact, x: at };
  });
  const top = bottom - TITLE_HEIGHT + 8;
  return (
    <g>
      {cells.map((cell) => (
        <g key={cell.label}>
          <path d={`M${cell.x} ${bottom}V${top}h${cell.width}`} fill="none" stroke="var(--ink)" strokeWidth="1.25" />
          <text x={cell.x + 8} y={top + 17} fontSize="10.5" fill="var(--ink-3)">
            {cell.label}
          </text>
          <text x={cell.x + 8} y={top + 36} fontSize="12.5" fontWeight="600" fill="var(--ink)" {...(cell.isMono ? { fontFamily: MONO, fontSize: "11.5" } : {})}>
            {cell.value}
          </text>
        </g>
      ))}
    </g>
  );
}
