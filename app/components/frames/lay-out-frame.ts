/**
 * Where the ruler draws what: rows of octets as transmitted, a span for each field in each row, lanes for fields that
 * overlap, gaps that nothing describes, and places for names that do not fit into their span. Pure.
 */

export type Placed = { readonly bitOffset: number; readonly bitLength: number };

/** Columns count bits from the left edge of the row; the first bit of octet 0 is column 0 of row 0. */
export type Span = {
  /** Index of the field in the list that was given; undefined for a gap. */
  readonly field: number | undefined;
  readonly row: number;
  readonly from: number;
  readonly to: number;
  readonly lane: number;
  /** False where the field goes on in the row above or below. */
  readonly begins: boolean;
  readonly ends: boolean;
};

export type FrameRows = {
  readonly rows: readonly { readonly octets: readonly number[]; readonly bits: number; readonly lanes: number }[];
  readonly spans: readonly Span[];
};

/** Octets a row: as many as the width gives each bit its least width; the rows are filled evenly. */
export function chooseOctetsPerRow(octets: number, width: number, bitWidth: number): number {
  const most = Math.max(1, Math.floor(width / (8 * bitWidth)));
  const rows = Math.ceil(octets / most);
  return Math.max(1, Math.ceil(octets / Math.max(1, rows)));
}

export function layOutFrame(octets: number, fields: readonly Placed[], octetsPerRow: number): FrameRows {
  const total = octets * 8;
  const bitsPerRow = octetsPerRow * 8;
  const lanes = assignLanes(fields);
  const spans: Span[] = [];
  fields.forEach((field, index) => {
    const from = total - field.bitOffset - field.bitLength;
    spans.push(...cut(index, from, from + field.bitLength, lanes[index] ?? 0, bitsPerRow));
  });
  for (const gap of findGaps(total, fields)) spans.push(...cut(undefined, gap.from, gap.to, 0, bitsPerRow));
  const rows = Array.from({ length: Math.ceil(octets / octetsPerRow) }, (_, row) => {
    const here = Array.from(
      { length: Math.min(octetsPerRow, octets - row * octetsPerRow) },
      (_, i) => row * octetsPerRow + i,
    );
    const deepest = spans.filter((span) => span.row === row).reduce((most, span) => Math.max(most, span.lane), 0);
    return { octets: here, bits: here.length * 8, lanes: deepest + 1 };
  });
  return { rows, spans };
}

/** Overlapping fields (a whole word and its bits) lie below each other; the longer one above. */
function assignLanes(fields: readonly Placed[]): number[] {
  const lanes = new Array<number>(fields.length).fill(0);
  const order = fields
    .map((_, i) => i)
    .sort((a, b) => (fields[b]?.bitLength ?? 0) - (fields[a]?.bitLength ?? 0) || a - b);
  const placed: number[] = [];
  for (const index of order) {
    const field = fields[index];
    if (!field) continue;
    const taken = new Set(placed.filter((other) => overlaps(fields[other], field)).map((other) => lanes[other]));
    let lane = 0;
    while (taken.has(lane)) lane++;
    lanes[index] = lane;
    placed.push(index);
  }
  return lanes;
}

function overlaps(a: Placed | undefined, b: Placed): boolean {
  return a !== undefined && a.bitOffset < b.bitOffset + b.bitLength && b.bitOffset < a.bitOffset + a.bitLength;
}

function findGaps(total: number, fields: readonly Placed[]): { from: number; to: number }[] {
  const taken = new Array<boolean>(total).fill(false);
  for (const { bitOffset, bitLength } of fields) {
    for (let bit = bitOffset; bit < bitOffset + bitLength; bit++) taken[total - 1 - bit] = true;
  }
  const gaps: { from: number; to: number }[] = [];
  for (let at = 0; at < total; at++) {
    if (taken[at]) continue;
    const from = at;
    while (at < total && !taken[at]) at++;
    gaps.push({ from, to: at });
  }
  return gaps;
}

function cut(field: number | undefined, from: number, to: number, lane: number, bitsPerRow: number): Span[] {
  const spans: Span[] = [];
  for (let at = from; at < to;) {
    const row = Math.floor(at / bitsPerRow);
    const end = Math.min(to, (row + 1) * bitsPerRow);
    spans.push({
      field,
      row,
      from: at - row * bitsPerRow,
      to: end - row * bitsPerRow,
      lane,
      begins: at === from,
      ends: end === to,
    });
    at = end;
  }
  return spans;
}

export type Tag = { readonly id: number; readonly anchor: number; readonly width: number };
export type PlacedTag = Tag & { readonly left: number; readonly lane: number };

const GAP = 4;

/**
 * Names beside narrow spans, hung on a line that comes down from the span: at the left of the line, or at its right where
 * the edge leaves no room. No name lies on another one, and no line runs through a name. All figures in pixels.
 */
export function placeTags(tags: readonly Tag[], width: number): { placed: PlacedTag[]; lanes: number } {
  const ascending = [...tags].sort((a, b) => a.anchor - b.anchor);
  const atLeft = ascending.filter((tag) => tag.anchor - tag.width - GAP >= 0);
  const atRight = ascending.filter((tag) => !atLeft.includes(tag)).reverse();
  const placed: PlacedTag[] = [];
  for (const tag of atLeft) placed.push(hang(tag, tag.anchor - GAP - tag.width, placed));
  for (const tag of atRight) placed.push(hang(tag, Math.min(tag.anchor + GAP, Math.max(0, width - tag.width)), placed));
  return { placed, lanes: placed.reduce((most, tag) => Math.max(most, tag.lane + 1), 0) };
}

/** In the first lane that is free for the name and to which the line can come down. */
function hang(tag: Tag, left: number, placed: readonly PlacedTag[]): PlacedTag {
  const right = left + tag.width;
  const isFree = (lane: number): boolean =>
    placed.every((other) => {
      const crosses = other.left < right + GAP && left < other.left + other.width + GAP;
      const lineOfOther = other.lane >= lane && other.anchor > left - 1 && other.anchor < right + 1;
      const ownLine = other.lane < lane && tag.anchor > other.left - 1 && tag.anchor < other.left + other.width + 1;
      return !(other.lane === lane && crosses) && !lineOfOther && !ownLine;
    });
  let lane = 0;
  while (!isFree(lane) && lane < placed.length) lane++;
  return { ...tag, left, lane };
}

/** The bits of the octets in the order of transmission. */
export function listBits(octets: Uint8Array): (0 | 1)[] {
  return Array.from(octets).flatMap((octet) => Array.from({ length: 8 }, (_, i) => ((octet >> (7 - i)) & 1) as 0 | 1));
}
