import { Plus, X } from "lucide-react";
import { Button, IconButton } from "~/components/ui/button";
import { Checkbox, TextArea, Field } from "~/components/ui/field";
import type { Transform } from "~/domain/mapping/mapping";
import { canConvert, unitByCode } from "~/domain/units/units";
import { CommitInput, FigureInput } from "./commit-input";
import { formatFigure, parseFigure } from "./parse-figure";

type Props = { transform: Transform; onChange: (next: Transform) => void };

/** The fields of one step. Every change is taken at once. */
export function TransformEditor({ transform, onChange }: Props) {
  switch (transform.kind) {
    case "linear":
      return (
        <div className="grid grid-cols-2 gap-3">
          <FigureInput
            label="Gradient"
            value={transform.gradient}
            onCommit={(gradient) => onChange({ ...transform, gradient })}
          />
          <FigureInput
            label="Offset"
            value={transform.offset}
            onCommit={(offset) => onChange({ ...transform, offset })}
          />
        </div>
      );
    case "unit":
      return <UnitFields transform={transform} onChange={onChange} />;
    case "bit":
      return (
        <div className="grid grid-cols-2 items-end gap-3">
          <FigureInput
            label="Bit, 0 the lowest"
            isWhole
            low={0}
            high={63}
            value={transform.bit}
            onCommit={(bit) => onChange({ ...transform, bit })}
          />
          <Checkbox
            label="Inverted: true when the bit is 0"
            checked={transform.invert === true}
            onChange={(event) =>
              onChange({ kind: "bit", bit: transform.bit, ...(event.currentTarget.checked ? { invert: true } : {}) })
            }
          />
        </div>
      );
    case "value-map":
      return <ValueMapFields transform={transform} onChange={onChange} />;
    case "lookup":
      return <LookupFields transform={transform} onChange={onChange} />;
    case "deadband":
      return (
        <FigureInput
          label="The old value stays until it differs by more than"
          low={0}
          value={transform.width}
          onCommit={(width) => onChange({ ...transform, width })}
        />
      );
    case "average":
      return (
        <FigureInput
          label="Mean of the last samples"
          isWhole
          low={2}
          high={10_000}
          value={transform.samples}
          onCommit={(samples) => onChange({ ...transform, samples })}
        />
      );
    case "counter":
      return (
        <div className="grid grid-cols-2 items-end gap-3">
          <FigureInput
            label="Width in bits"
            isWhole
            low={1}
            high={53}
            value={transform.bits}
            onCommit={(bits) => onChange({ ...transform, bits })}
          />
          <Checkbox
            label="A step back is a reset, not a wrap"
            checked={transform.resets === true}
            onChange={(event) =>
              onChange({
                kind: "counter",
                bits: transform.bits,
                ...(event.currentTarget.checked ? { resets: true } : {}),
              })
            }
          />
        </div>
      );
  }
}

type Of<K extends Transform["kind"]> = { transform: Extract<Transform, { kind: K }>; onChange: Props["onChange"] };

function UnitFields({ transform, onChange }: Of<"unit">) {
  const fits = canConvert(transform.from, transform.to);
  const take = (end: "from" | "to") => (text: string) => {
    const code = text.trim().toUpperCase();
    if (!unitByCode(code)) return `UN/CEFACT Rec. 20 has no code ${code}`;
    onChange({ ...transform, [end]: code });
    return undefined;
  };
  return (
    <div className="grid grid-cols-2 gap-3">
      <CommitInput
        label="From, UN/CEFACT code"
        mono
        value={transform.from}
        onCommit={take("from")}
        hint={unitByCode(transform.from)?.name}
      />
      <CommitInput label="To" mono value={transform.to} onCommit={take("to")} hint={unitByCode(transform.to)?.name} />
      {fits ? null : <p className="col-span-2 text-note text-error">These two measure different things.</p>}
    </div>
  );
}

function ValueMapFields({ transform, onChange }: Of<"value-map">) {
  const set = (index: number, entry: (typeof transform.entries)[number]) =>
    onChange({ ...transform, entries: transform.entries.map((old, i) => (i === index ? entry : old)) });
  return (
    <div className="grid gap-1.5">
      <ul className="grid max-h-40 gap-1 overflow-y-auto">
        {transform.entries.map((entry, index) => (
          <li key={index} className="grid grid-cols-[1fr_1fr_24px] items-end gap-2">
            <CommitInput
              label={index === 0 ? "Raw value" : `Raw value ${index + 1}`}
              mono
              value={String(entry.from)}
              onCommit={(text) => {
                set(index, { ...entry, from: toScalar(text) });
                return undefined;
              }}
            />
            <CommitInput
              label={index === 0 ? "Becomes" : `Becomes ${index + 1}`}
              mono
              value={String(entry.to)}
              onCommit={(text) => {
                const to = toScalar(text);
                set(index, { ...entry, to: typeof to === "boolean" ? Number(to) : to });
                return undefined;
              }}
            />
            <IconButton
              icon={X}
              size="small"
              label={`Remove value ${index + 1}`}
              {...(transform.entries.length === 1 ? { blockedBy: "a map needs one value" } : {})}
              onClick={() => onChange({ ...transform, entries: transform.entries.filter((_, i) => i !== index) })}
            />
          </li>
        ))}
      </ul>
      <div className="flex items-end gap-3">
        <Button
          size="small"
          icon={Plus}
          onClick={() =>
            onChange({ ...transform, entries: [...transform.entries, { from: nextRaw(transform.entries), to: 0 }] })
          }
        >
          Value
        </Button>
        <CommitInput
          label="All others (empty: Bad)"
          mono
          className="w-40"
          value={transform.otherwise === undefined ? "" : String(transform.otherwise)}
          onCommit={(text) => {
            const { otherwise: _old, ...rest } = transform;
            const value = toScalar(text);
            onChange(
              text.trim() === "" ? rest : { ...rest, otherwise: typeof value === "boolean" ? Number(value) : value },
            );
            return undefined;
          }}
        />
      </div>
    </div>
  );
}

function toScalar(text: string): number | boolean | string {
  const trimmed = text.trim();
  if (trimmed === "true" || trimmed === "false") return trimmed === "true";
  return parseFigure(trimmed) ?? trimmed;
}

function nextRaw(entries: readonly { from: number | boolean | string }[]): number {
  return Math.max(-1, ...entries.map((entry) => (typeof entry.from === "number" ? entry.from : -1))) + 1;
}

/** Points as rows of text, so that a table can be pasted. */
function LookupFields({ transform, onChange }: Of<"lookup">) {
  const text = transform.points.map(([x, y]) => `${formatFigure(x)}\t${formatFigure(y)}`).join("\n");
  return (
    <div className="grid grid-cols-[1fr_140px] gap-3">
      <Field
        label="Points: input, output, one pair a line"
        hint="Straight lines between them; outside, the end value with limit bits."
      >
        {(tied) => (
          <TextArea
            key={text}
            {...tied}
            mono
            rows={4}
            defaultValue={text}
            onBlur={(event) => {
              const points = parsePoints(event.currentTarget.value);
              if (points && event.currentTarget.value !== text) onChange({ ...transform, points });
            }}
          />
        )}
      </Field>
      <LookupCurve points={transform.points} />
    </div>
  );
}

export function parsePoints(text: string): [number, number][] | undefined {
  const points = text
    .split(/\r?\n/)
    .filter((line) => line.trim() !== "")
    .map((line) =>
      line
        .trim()
        .split(/[\t;]|\s+/)
        .filter(Boolean)
        .map(parseFigure),
    );
  const isWhole =
    points.length >= 2 && points.every((pair) => pair.length === 2 && pair.every((figure) => figure !== undefined));
  return isWhole ? (points as [number, number][]) : undefined;
}

function LookupCurve({ points }: { points: readonly (readonly [number, number])[] }) {
  const sorted = [...points].sort((a, b) => a[0] - b[0]);
  const [xs, ys] = [sorted.map((p) => p[0]), sorted.map((p) => p[1])];
  const scale = (value: number, list: readonly number[], size: number) => {
    const [low, high] = [Math.min(...list), Math.max(...list)];
    return high === low ? size / 2 : ((value - low) / (high - low)) * size;
  };
  const path = sorted
    .map(
      ([x, y], i) =>
        `${i === 0 ? "M" : "L"}${(10 + scale(x, xs, 120)).toFixed(1)} ${(70 - scale(y, ys, 60)).toFixed(1)}`,
    )
    .join("");
  return (
    <svg
      viewBox="0 0 140 80"
      className="mt-4 w-full border border-hair bg-paper"
      role="img"
      aria-label="The table as a curve"
    >
      <path d="M10 70H134M10 70V6" stroke="var(--edge)" fill="none" />
      <path d={path} stroke="var(--ink)" strokeWidth={1.5} fill="none" />
      {sorted.map(([x, y]) => (
        <circle key={x} cx={10 + scale(x, xs, 120)} cy={70 - scale(y, ys, 60)} r={2.4} fill="var(--ink)" />
      ))}
    </svg>
  );
}
