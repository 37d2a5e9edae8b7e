import type { ReactElement } from "react";

/**
 * Ends of reference lines, OPC 10000-3 Annex C, Table C.2. A line is drawn from the source to the target; `subtype` is
 * drawn from the subtype to the supertype, since its heads stand there.
 */
export type LineEnd =
  | "component"
  | "property"
  | "type-definition"
  | "subtype"
  | "interface"
  | "event-source"
  | "hierarchical"
  | "other"
  | "symmetric";

/** Line ends with dashes tell themselves from a twin with the same head. */
export function isDashedLine(end: LineEnd): boolean {
  return end === "interface";
}

type MarkerShape = { width: number; refX: number; draw: (stroke: string) => ReactElement };

const closed = "M1.5 2.5 12.5 7l-11 4.5z";
const closedTwice = "M1.5 2.5 12.5 7l-11 4.5zM12.5 2.5 23.5 7l-11 4.5z";
const hollow = (d: string, stroke: string) => <path d={d} fill="var(--paper)" stroke={stroke} strokeWidth={1.25} />;
const filled = (d: string, stroke: string) => <path d={d} fill={stroke} stroke={stroke} />;

const shapes: Record<LineEnd, MarkerShape> = {
  component: { width: 18, refX: 18, draw: (s) => <path d="M8 2v10" stroke={s} strokeWidth={1.5} fill="none" /> },
  property: {
    width: 18,
    refX: 18,
    draw: (s) => <path d="M5.5 2v10M10.5 2v10" stroke={s} strokeWidth={1.5} fill="none" />,
  },
  "type-definition": { width: 24, refX: 23.5, draw: (s) => filled(closedTwice, s) },
  subtype: { width: 24, refX: 23.5, draw: (s) => hollow(closedTwice, s) },
  interface: { width: 14, refX: 12.5, draw: (s) => hollow(closed, s) },
  "event-source": { width: 14, refX: 12.5, draw: (s) => hollow(closed, s) },
  hierarchical: {
    width: 14,
    refX: 12.5,
    draw: (s) => <path d="M2 2 12.5 7 2 12" stroke={s} strokeWidth={1.4} fill="none" />,
  },
  other: { width: 14, refX: 12.5, draw: (s) => filled(closed, s) },
  symmetric: { width: 14, refX: 12.5, draw: (s) => filled(closed, s) },
};

const strokes = { ink: "var(--ink)", copper: "var(--copper)", soft: "var(--edge)" } as const;
export type LineTone = keyof typeof strokes;

export function lineEndMarkerId(end: LineEnd, tone: LineTone = "ink"): string {
  return `line-end-${end}-${tone}`;
}

/** The markers as definitions inside a drawing; `prefix` keeps those of a picture apart from those of the page. */
export function LineEndDefinitions({ prefix = "" }: { prefix?: string }) {
  return (
    <defs>
      {(Object.keys(shapes) as LineEnd[]).flatMap((end) =>
        (Object.keys(strokes) as LineTone[]).map((tone) => {
          const shape = shapes[end];
          return (
            <marker
              key={lineEndMarkerId(end, tone)}
              id={prefix + lineEndMarkerId(end, tone)}
              markerWidth={shape.width}
              markerHeight={14}
              refX={shape.refX}
              refY={7}
              orient="auto-start-reverse"
              markerUnits="userSpaceOnUse"
            >
              {shape.draw(strokes[tone])}
            </marker>
          );
        }),
      )}
    </defs>
  );
}

/** The markers, once in a document that draws reference lines: `markerEnd={url(#…)}` with `lineEndMarkerId`. */
export function LineEndMarkers() {
  return (
    <svg width="0" height="0" className="absolute" aria-hidden>
      <LineEndDefinitions />
    </svg>
  );
}

/** A short line with its end, for legends and menus. Draws without the shared markers. */
export function LineEndSample({ end, width = 52 }: { end: LineEnd; width?: number }) {
  const shape = shapes[end];
  return (
    <svg width={width} height={14} viewBox={`0 0 ${width} 14`} className="shrink-0" aria-hidden>
      <path
        d={`M0 7H${width - 1}`}
        stroke="var(--ink)"
        strokeWidth={1.25}
        {...(isDashedLine(end) ? { strokeDasharray: "4 3" } : {})}
      />
      <g transform={`translate(${width - 1 - shape.refX} 0)`}>{shape.draw("var(--ink)")}</g>
      {end === "symmetric" ? (
        <g transform={`translate(${shape.refX} 14) rotate(180)`}>{shape.draw("var(--ink)")}</g>
      ) : null}
    </svg>
  );
}
