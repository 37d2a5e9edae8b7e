import { useId } from "react";
import { findOptionBits, hasBit, withBit, type OptionBit } from "../values/option-bits";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { Checkbox } from "../ui/field";

type Props = {
  label: string;
  space: AddressSpace;
  /** The option set of the standard that names the bits. */
  dataType: NodeKey;
  value: number | undefined;
  /** What holds where nothing is written. */
  fallback?: number;
  readOnly: boolean;
  /** undefined: nothing is written, the fallback holds. */
  onChange: (value: number | undefined) => void;
};

/** A mask as ticks that unfold from one line. The names of the bits are those of the loaded standard. */
export function BitField({ label, space, dataType, value, fallback = 0, readOnly, onChange }: Props) {
  const id = useId();
  const bits = findOptionBits(space, dataType) ?? [];
  const shown = value ?? fallback;
  return (
    <div className="particular">
      <span className="particular-key" id={id}>
        {label}
      </span>
      <details className="bit-field">
        <summary aria-labelledby={`${id} ${id}-text`}>
          <span id={`${id}-text`} className={value === undefined ? "text-ink-3" : ""}>
            {describeBits(shown, bits)}
            {value === undefined ? ", not written" : ""}
          </span>
        </summary>
        <div role="group" aria-labelledby={id} className="grid gap-0.5 py-1">
          {bits.map(({ bit, name, description }) => (
            <Checkbox
              key={bit}
              label={name}
              title={description}
              checked={hasBit(shown, bit)}
              disabled={readOnly}
              onChange={(event) => onChange(withBit(shown, bit, event.currentTarget.checked))}
            />
          ))}
          {value === undefined || readOnly ? null : (
            <button
              type="button"
              className="justify-self-start text-note text-ink-3 underline decoration-rule underline-offset-3 hover:text-copper"
              onClick={() => onChange(undefined)}
            >
              Write nothing
            </button>
          )}
        </div>
      </details>
    </div>
  );
}

function describeBits(value: number, bits: readonly OptionBit[]): string {
  if (value === 0) return "none";
  const names = bits.filter(({ bit }) => hasBit(value, bit)).map(({ name }) => name);
  if (names.length === 0) return String(value);
  return names.length > 3 ? `${names.length} of ${bits.length}` : names.join(", ");
}
