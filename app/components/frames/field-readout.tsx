import type { ReactNode } from "react";
import { StatusBadge } from "~/components/notation/status-badge";
import type { FrameField } from "./frame-fields";
import type { FieldReading } from "./read-fields";

type Props = { field: FrameField | undefined; reading: FieldReading | undefined; feeds?: string | undefined };

/** The facts of the field under the pointer or the focus, always at the same place. */
export function FieldReadout({ field, reading, feeds }: Props) {
  return (
    <div
      className="mt-2 flex min-h-10 flex-wrap items-start gap-x-6 gap-y-1 border-t border-hair pt-1.5 text-small"
      aria-live="off"
    >
      {field ? (
        <>
          <Fact term="Field">
            <span className="font-semibold">{field.name}</span>{" "}
            <span className="font-mono text-note text-ink-3">subindex {field.subindex}</span>
          </Fact>
          <Fact term="Type" mono>
            {field.typeText}
          </Fact>
          <Fact term="Place" mono>
            bits {field.bitText} · {field.octetText}
          </Fact>
          {field.scaleText ? (
            <Fact term="Scale" mono>
              {field.scaleText}
            </Fact>
          ) : null}
          {field.rangeText ? (
            <Fact term="Range" mono>
              {field.rangeText}
            </Fact>
          ) : null}
          <Fact term="Unit">{field.unitText || "none"}</Fact>
          {field.named.length > 0 ? (
            <Fact term="Named values">
              {field.named.slice(0, 4).map((value, i) => (
                <span key={value.raw}>
                  {i > 0 ? " · " : ""}
                  <span className="font-mono">{value.raw}</span> {value.text}
                </span>
              ))}
              {field.named.length > 4 ? ` · ${field.named.length - 4} more` : ""}
            </Fact>
          ) : null}
          {reading ? (
            <Fact term="Value">
              <span className="font-mono font-semibold">
                {reading.value} {reading.unit}
              </span>{" "}
              <StatusBadge status={reading.tone}>{reading.status}</StatusBadge>
            </Fact>
          ) : null}
          {feeds ? <Fact term="Feeds">{feeds}</Fact> : null}
        </>
      ) : (
        <p className="pt-1 text-note text-ink-3">
          Bit 0 is the last bit of the last octet. Point at a field, or walk with the arrow keys, to see its type,
          place, range and unit.
        </p>
      )}
    </div>
  );
}

function Fact({ term, mono, children }: { term: string; mono?: boolean; children: ReactNode }) {
  return (
    <div className="min-w-0">
      <div className="text-key text-ink-3">{term}</div>
      <div className={mono ? "font-mono" : undefined}>{children}</div>
    </div>
  );
}
