/**
 * One spelling for values that say the same. On the wire a null text, an empty one and one without locale cannot always be
 * told apart, and a file may write each of them in several ways.
 */
import type { XmlText } from "../address-space/node";
import type { DataTypeLookup } from "../nodeset/values/data-type-shapes";
import { readValue } from "../nodeset/values/read-value";
import type { ExtensionObject, Scalar, Variant } from "../nodeset/values/variant";
import { writeValue } from "../nodeset/values/write-value";
import type { LocalizedText } from "../address-space/qualified-name";

/** The value in its one spelling; as it was where it cannot be read. */
export function normaliseValue(value: XmlText, types: DataTypeLookup): XmlText {
  const read = readValue(value, types);
  return read.ok ? writeValue(normaliseVariant(read.value), types) : value;
}

function normaliseVariant(variant: Variant): Variant {
  const normalise = (value: Scalar): Scalar => normaliseScalar(variant.type, value);
  if (variant.shape === "scalar") return { ...variant, value: normalise(variant.value) } as Variant;
  return { ...variant, values: variant.values.map(normalise) } as Variant;
}

function normaliseScalar(type: Variant["type"], value: Scalar): Scalar {
  switch (type) {
    case "LocalizedText": {
      const { locale, text } = (value as LocalizedText | null) ?? { text: "" };
      return locale ? { locale, text } : { text };
    }
    case "String":
    case "ByteString":
      return value ?? "";
    case "ExtensionObject":
      return normaliseStructure(value as ExtensionObject | null);
    case "Variant":
      return value === null ? null : normaliseVariant(value as Variant);
    default:
      return value;
  }
}

function normaliseStructure(value: ExtensionObject | null): ExtensionObject | null {
  if (value?.kind !== "structure") return value;
  const fields = Object.entries(value.fields).map(([name, field]) => [name, normaliseVariant(field)] as const);
  return { ...value, fields: Object.fromEntries(fields) };
}
