/** Option sets as lists of ticks (OPC 10000-3 §8.40). */
import type { ScalarOf } from "~/domain/nodeset/values/variant";
import { Checkbox } from "../ui/field";
import { hasBit, hasByteBit, listUnnamedBits, withBit, withByteBit, type OptionBit } from "./option-bits";
import type { DraftStructure } from "./value-draft";
import { useValueForm, type LeafProps } from "./value-form";

/** Bits of an unsigned integer; bits without a name stay as they are and are named. */
export function WordBits({ label, item, onChange, bits }: LeafProps & { bits: readonly OptionBit[] }) {
  const { readOnly } = useValueForm();
  const value = item as number | bigint;
  const unnamed = listUnnamedBits(value, bits);
  return (
    <fieldset aria-label={label} className="bit-list">
      {bits.map(({ bit, name, description }) => (
        <Checkbox
          key={bit}
          label={<BitName bit={bit} name={name} />}
          title={description}
          checked={hasBit(value, bit)}
          disabled={readOnly}
          onChange={(event) => onChange(withBit(value, bit, event.currentTarget.checked))}
        />
      ))}
      <p className="col-span-full text-note text-ink-3">
        <span className="font-mono">{String(value)}</span>
        {unnamed.length > 0 ? `, with ${unnamed.map((bit) => `bit ${bit}`).join(", ")} that has no name` : ""}
      </p>
    </fieldset>
  );
}

function BitName({ bit, name }: { bit: number; name: string }) {
  return (
    <>
      {name} <span className="font-mono text-note text-ink-3">{bit}</span>
    </>
  );
}

/** A structure below OptionSet: each bit is on or off, and valid or not. */
export function ByteBits({
  value,
  bits,
  onChange,
}: {
  value: DraftStructure;
  bits: readonly OptionBit[];
  onChange: (value: DraftStructure) => void;
}) {
  const { readOnly } = useValueForm();
  const read = (name: string): ScalarOf["ByteString"] => {
    const field = value.fields[name];
    return field?.shape === "scalar" && typeof field.value === "string" ? field.value : null;
  };
  const set = (name: "Value" | "ValidBits", bit: number, on: boolean): void =>
    onChange({
      ...value,
      fields: {
        ...value.fields,
        [name]: { type: "ByteString", shape: "scalar", value: withByteBit(read(name), bit, on) },
      },
    });
  return (
    <table className="small-table" aria-label="Bits">
      <thead>
        <tr>
          <th scope="col">Bit</th>
          <th scope="col">Set</th>
          <th scope="col">Valid</th>
        </tr>
      </thead>
      <tbody>
        {bits.map(({ bit, name, description }) => (
          <tr key={bit}>
            <th scope="row" className="border-b-hair! text-ink!" title={description}>
              <BitName bit={bit} name={name} />
            </th>
            <td>
              <Checkbox
                label=""
                aria-label={`${name} is set`}
                checked={hasByteBit(read("Value"), bit)}
                disabled={readOnly}
                onChange={(event) => set("Value", bit, event.currentTarget.checked)}
              />
            </td>
            <td>
              <Checkbox
                label=""
                aria-label={`${name} is valid`}
                checked={hasByteBit(read("ValidBits"), bit)}
                disabled={readOnly}
                onChange={(event) => set("ValidBits", bit, event.currentTarget.checked)}
              />
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
