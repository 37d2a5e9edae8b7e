import { FerruleBadge } from "~/components/notation/ferrule-badge";
import { cx } from "~/components/ui/cx";
import type { FieldActions } from "./field-actions";
import type { FrameField, FrameView } from "./frame-fields";
import { listBits, placeTags, type FrameRows, type Span } from "./lay-out-frame";
import type { FieldReading } from "./read-fields";

const HEAD = 16;
const BITS = 22;
const HEX = 24;
const LANE = 50;
const TAG = 19;
const LETTER = 6.7;
const TAG_LETTER = 7.2;
/** Height of one wire's way to the right, below a row. */
export const TRACK = 7;

type Props = FieldActions & {
  row: FrameRows["rows"][number];
  spans: readonly Span[];
  width: number;
  view: FrameView;
  octets: Uint8Array | undefined;
  readings: ReadonlyMap<number, FieldReading> | undefined;
  picked: ReadonlySet<number> | undefined;
  feeds: ReadonlyMap<number, string> | undefined;
  wires: { readonly prefix: string; readonly counts: ReadonlyMap<number, number> } | undefined;
  here: number | undefined;
  tabStop: number;
  onHere: (field: number | undefined) => void;
};

/** One row of the ruler: octet numbers, bits, hexadecimal, the fields as spans, and names beside narrow ones. */
export function FrameRow(props: Props) {
  const { row, spans, width, view, readings, octets } = props;
  const bit = width / row.bits;
  const top = HEAD + BITS + HEX;
  const fieldsBottom = top + row.lanes * LANE;
  const narrow = spans.filter(
    (span) => span.field !== undefined && span.begins && !fits(view.fields[span.field], span, bit),
  );
  const tags = placeTags(
    narrow.map((span) => ({
      id: span.field ?? 0,
      anchor: ((span.from + span.to) / 2) * bit,
      width: measureTag(view.fields[span.field ?? 0], readings),
    })),
    width,
  );
  const tagsBottom = fieldsBottom + (tags.lanes > 0 ? 6 + tags.lanes * TAG : 0);
  const tracks = spans.reduce((sum, span) => sum + countWires(props, span), 0);
  return (
    <div
      data-tracks-below={tagsBottom}
      className="relative"
      style={{ width, height: tagsBottom + (tracks > 0 ? 4 + tracks * TRACK : 0) }}
    >
      {row.octets.map((octet, i) => (
        <OctetCells
          key={octet}
          octet={octet}
          left={i * 8 * bit}
          width={8 * bit}
          value={octets?.[octet]}
          total={view.octets}
        />
      ))}
      <div aria-hidden className="absolute inset-x-0 border-b-[1.5px] border-ink" style={{ top: top - 1.5 }} />
      {tags.placed.map((tag) => {
        const y = fieldsBottom + 6 + tag.lane * TAG;
        return (
          <span key={tag.id} aria-hidden>
            <span
              className="absolute border-l border-ink-3"
              style={{ left: tag.anchor, top: fieldsBottom - 6, height: y - fieldsBottom + 16 }}
            />
            <TagText
              tag={tag}
              y={y}
              field={view.fields[tag.id]}
              reading={readings?.get(view.fields[tag.id]?.subindex ?? -1)}
              isHere={props.here === tag.id}
            />
          </span>
        );
      })}
      {spans.map((span) =>
        span.field === undefined ? (
          <Gap key={`gap ${span.from}`} span={span} bit={bit} top={top} height={row.lanes * LANE} />
        ) : (
          <FieldSpan key={`${span.field} ${span.from}`} {...props} span={span} bit={bit} top={top} />
        ),
      )}
    </div>
  );
}

function countWires({ wires, view }: Props, span: Span): number {
  const field = span.field === undefined || !span.begins ? undefined : view.fields[span.field];
  return field === undefined ? 0 : (wires?.counts.get(field.subindex) ?? 0);
}

function fits(field: FrameField | undefined, span: Span, bit: number): boolean {
  return field !== undefined && (span.to - span.from) * bit >= field.name.length * LETTER + 14;
}

function measureTag(field: FrameField | undefined, readings: Props["readings"]): number {
  const value = field && readings?.get(field.subindex);
  return ((field?.name.length ?? 0) + (value ? value.value.length + value.unit.length + 3 : 0)) * TAG_LETTER + 14;
}

function OctetCells({
  octet,
  left,
  width,
  value,
  total,
}: {
  octet: number;
  left: number;
  width: number;
  value: number | undefined;
  total: number;
}) {
  const bits = value === undefined ? undefined : listBits(Uint8Array.of(value));
  const high = (total - octet) * 8 - 1;
  return (
    <div aria-hidden className="absolute top-0" style={{ left, width }}>
      <div className="text-center text-note text-ink-3" style={{ height: HEAD }}>
        octet {octet}
      </div>
      <div className="grid grid-cols-8 border-y border-r border-edge font-mono text-note" style={{ height: BITS }}>
        {Array.from({ length: 8 }, (_, i) => (
          <span
            key={i}
            className={cx(
              "grid place-items-center border-hair",
              i > 0 && "border-l",
              i === 0 && octet === 0 && "border-l border-l-edge",
              !bits && "text-ink-3",
            )}
          >
            {bits ? bits[i] : width > 150 || i === 0 || i === 7 ? <span className="text-[9px]">{high - i}</span> : ""}
          </span>
        ))}
      </div>
      <div
        className={cx(
          "grid place-items-center border-r border-edge font-mono text-small font-semibold",
          octet === 0 && "border-l",
        )}
        style={{ height: HEX }}
      >
        {value === undefined ? (
          <span className="font-normal text-ink-3">··</span>
        ) : (
          value.toString(16).toUpperCase().padStart(2, "0")
        )}
      </div>
    </div>
  );
}

function Gap({ span, bit, top, height }: { span: Span; bit: number; top: number; height: number }) {
  const bits = span.to - span.from;
  const words = `not described, ${bits} ${bits === 1 ? "bit" : "bits"}`;
  return (
    <div
      title={words}
      className="absolute grid place-items-center overflow-hidden border-r border-rule text-note text-ink-3 hatch"
      style={{ left: span.from * bit, width: bits * bit, top, height }}
    >
      {bits * bit > words.length * 6 ? (
        <span className="bg-paper px-1">{words}</span>
      ) : (
        <span className="sr-only">{words}</span>
      )}
    </div>
  );
}

function FieldSpan(props: Props & { span: Span; bit: number; top: number }) {
  const { span, bit, top, view, readings, picked, feeds, here, tabStop, onHere, onPick, onDragStart, onDragEnd } =
    props;
  const index = span.field ?? 0;
  const field = view.fields[index];
  if (!field) return null;
  const reading = readings?.get(field.subindex);
  const isPicked = picked?.has(field.subindex) ?? false;
  const hue = index % 6;
  const style = {
    left: span.from * bit,
    width: (span.to - span.from) * bit,
    top: top + span.lane * LANE,
    height: LANE - 4,
    background: isPicked ? "var(--copper-wash)" : `var(--field-${hue})`,
    borderColor: isPicked ? "var(--copper)" : `var(--field-${hue}-line)`,
  };
  const className = cx(
    "absolute overflow-hidden border border-t-0 px-1 text-left text-small leading-[15px]",
    (here === index || isPicked) && "border-t-[3px]! border-t-copper!",
    !span.begins && "border-l-0",
    !span.ends && "border-r-0",
  );
  if (!span.begins) return <div aria-hidden className={className} style={style} />;
  const name = describeSpan(field, reading, feeds?.get(field.subindex));
  return (
    <button
      type="button"
      data-field={index}
      {...(props.wires ? { "data-pin": `${props.wires.prefix}${field.subindex}` } : {})}
      tabIndex={index === tabStop ? 0 : -1}
      aria-label={name}
      {...(onPick ? { "aria-pressed": isPicked } : {})}
      draggable={onDragStart !== undefined}
      onDragStart={(event) => onDragStart?.(field, event)}
      onDragEnd={() => onDragEnd?.()}
      onClick={() => onPick?.(field)}
      onFocus={() => onHere(index)}
      onBlur={() => onHere(undefined)}
      onPointerEnter={() => onHere(index)}
      onPointerLeave={() => onHere(undefined)}
      className={cx(className, "focus-visible:z-10", onDragStart && "cursor-grab")}
      style={style}
    >
      {fits(field, span, bit) ? (
        <>
          <span className="flex items-center gap-1 truncate font-semibold">
            {field.name}
            {feeds?.has(field.subindex) ? <FerruleBadge feed="fed" width={16} /> : null}
          </span>
          <span className="flex justify-between gap-1 font-mono text-key text-ink-2">
            <span className="truncate">{field.typeText}</span>
            <span className="shrink-0">{field.bitLength * bit > 150 ? field.bitText : ""}</span>
          </span>
          <span className="block truncate font-mono font-semibold">
            {reading ? `${reading.value}${reading.unit ? ` ${reading.unit}` : ""}` : ""}
          </span>
        </>
      ) : null}
    </button>
  );
}

function TagText({
  tag,
  y,
  field,
  reading,
  isHere,
}: {
  tag: { left: number; width: number };
  y: number;
  field: FrameField | undefined;
  reading: FieldReading | undefined;
  isHere: boolean;
}) {
  return (
    <span
      className={cx("absolute truncate bg-paper px-1 text-small leading-[17px] font-semibold", isHere && "text-copper")}
      style={{ left: tag.left, width: tag.width, top: y }}
    >
      {field?.name}
      {reading ? (
        <span className="ml-1.5 font-mono">
          {reading.value}
          {reading.unit ? ` ${reading.unit}` : ""}
        </span>
      ) : null}
    </span>
  );
}

/** All that sight tells of a span, for ears. */
export function describeSpan(field: FrameField, reading: FieldReading | undefined, feeds: string | undefined): string {
  return [
    field.name,
    field.typeText,
    `bits ${field.bitText}`,
    field.octetText,
    field.scaleText === "" ? "" : field.scaleText,
    field.unitText,
    reading ? `value ${reading.value} ${reading.unit}, ${reading.status}` : "",
    feeds ? `feeds ${feeds}` : "",
  ]
    .filter((part) => part !== "")
    .join(", ");
}
