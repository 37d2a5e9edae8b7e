/**
 * The way of each wire from a field to its terminal: down to a track of its own below the ruler's row, right to a track of
 * its own in the gutter, up or down, and into the terminal. Never two wires on one track. Pure; pixels from the upper left
 * corner of the drawing.
 */

export type WireEnds = {
  readonly id: string;
  /** Where the wire leaves its source. */
  readonly x: number;
  readonly y: number;
  /** Top of the tracks below the row of the ruler; absent for a source whose right edge faces the gutter. */
  readonly tracksTop?: number | undefined;
  readonly terminalX: number;
  readonly terminalY: number;
};

export type Wire = {
  readonly id: string;
  readonly path: string;
  readonly end: { readonly x: number; readonly y: number };
};

const TRACK_HEIGHT = 7;
const FIRST_TRACK = 4;

export function routeWires(
  wires: readonly WireEnds[],
  gutter: { readonly left: number; readonly right: number },
): Wire[] {
  const levels = assignLevels(wires);
  const down = wires.filter((wire) => wire.terminalY > (levels.get(wire.id) ?? 0));
  const up = wires.filter((wire) => !down.includes(wire));
  const bySource = (a: WireEnds, b: WireEnds) => (levels.get(a.id) ?? 0) - (levels.get(b.id) ?? 0);
  // A wire that goes down must stand right of those that start below it, one that goes up right of those that start above.
  const columns = [...up.sort(bySource), ...down.sort(bySource).reverse()];
  const step = (gutter.right - gutter.left) / (columns.length + 1);
  return columns.map((wire, index) => {
    const x = Math.round(gutter.left + step * (index + 1)) + 0.5;
    const level = levels.get(wire.id) ?? wire.y;
    const start = wire.tracksTop === undefined ? `M${wire.x} ${level}` : `M${wire.x} ${wire.y}V${level}`;
    return {
      id: wire.id,
      path: `${start}H${x}V${wire.terminalY}H${wire.terminalX}`,
      end: { x: wire.terminalX, y: wire.terminalY },
    };
  });
}

/** Below a row the wire that starts furthest right lies highest, so that wires leave without crossing each other. */
function assignLevels(wires: readonly WireEnds[]): Map<string, number> {
  const levels = new Map<string, number>();
  const rows = new Map<number, WireEnds[]>();
  for (const wire of wires) {
    if (wire.tracksTop === undefined) levels.set(wire.id, Math.round(wire.y) + 0.5);
    else rows.set(wire.tracksTop, [...(rows.get(wire.tracksTop) ?? []), wire]);
  }
  for (const [top, row] of rows) {
    row
      .sort((a, b) => b.x - a.x)
      .forEach((wire, i) => levels.set(wire.id, Math.round(top) + FIRST_TRACK + i * TRACK_HEIGHT + 0.5));
  }
  return levels;
}
