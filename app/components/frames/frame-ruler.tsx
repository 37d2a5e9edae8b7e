import { useMemo, useRef, useState, type KeyboardEvent } from "react";
import { FieldReadout } from "./field-readout";
import type { FieldActions } from "./field-actions";
import type { FrameView } from "./frame-fields";
import { FrameRow } from "./frame-row";
import { chooseOctetsPerRow, layOutFrame } from "./lay-out-frame";
import type { FieldReading } from "./read-fields";
import { useWidth } from "./use-width";

const LEAST_BIT_WIDTH = 11;

type Props = FieldActions & {
  /** `QS-U30, process data in`. */
  label: string;
  view: FrameView;
  octets?: Uint8Array | undefined;
  readings?: ReadonlyMap<number, FieldReading> | undefined;
  /** Subindexes that are picked. */
  picked?: ReadonlySet<number> | undefined;
  /** Subindexes that feed something, with what. */
  feeds?: ReadonlyMap<number, string> | undefined;
  /** Leaves the readout away where the page shows the facts itself. */
  quiet?: boolean;
  /** Where wires leave: the pin's name before the subindex, and how many wires each field has. */
  wires?: { readonly prefix: string; readonly counts: ReadonlyMap<number, number> } | undefined;
};

/** Process data as a ruler of bits, octet by octet as transmitted; each field a coloured, named span. Arrow keys walk. */
export function FrameRuler({ label, view, octets, readings, picked, feeds, quiet, wires, ...actions }: Props) {
  const [box, width] = useWidth(1_100);
  const [here, setHere] = useState<number | undefined>(undefined);
  const [tabStop, setTabStop] = useState(0);
  const list = useRef<HTMLDivElement>(null);
  const perRow = chooseOctetsPerRow(view.octets, width, LEAST_BIT_WIDTH);
  const drawn = useMemo(() => layOutFrame(view.octets, view.fields, perRow), [view, perRow]);
  const stop = Math.min(tabStop, Math.max(0, view.fields.length - 1));
  const shown = here === undefined ? view.fields.find((field) => picked?.has(field.subindex)) : view.fields[here];

  function onKeyDown(event: KeyboardEvent) {
    const step = { ArrowRight: 1, ArrowDown: 1, ArrowLeft: -1, ArrowUp: -1, Home: -1_000, End: 1_000 }[event.key];
    if (step === undefined) return;
    event.preventDefault();
    const next = Math.max(0, Math.min(view.fields.length - 1, stop + step));
    setTabStop(next);
    list.current?.querySelector<HTMLElement>(`[data-field="${next}"]`)?.focus();
  }

  return (
    <div ref={box} className="min-w-0">
      <div ref={list} role="group" aria-label={label} onKeyDown={onKeyDown} className="grid gap-3">
        {drawn.rows.map((row, index) => (
          <FrameRow
            key={row.octets[0] ?? index}
            row={row}
            spans={drawn.spans.filter((span) => span.row === index)}
            width={(width * row.octets.length) / perRow}
            view={view}
            octets={octets}
            readings={readings}
            picked={picked}
            feeds={feeds}
            wires={wires}
            here={here}
            tabStop={stop}
            onHere={(field) => {
              setHere(field);
              if (field !== undefined) setTabStop(field);
            }}
            {...actions}
          />
        ))}
      </div>
      {quiet ? null : (
        <FieldReadout
          field={shown}
          reading={shown && readings?.get(shown.subindex)}
          feeds={shown && feeds?.get(shown.subindex)}
        />
      )}
    </div>
  );
}
