/** EUInformation in values, and the codes behind unit ids (OPC 10000-8 §5.6.3). */
import { UNECE_URI } from "./example-values";
import { listBodiesBelow, makeTreeQuestion, textOf } from "./value-xml";

export const IEC_URI = "http://www.opcfoundation.org/UA/units/cdd/IEC62720";

export type UnitValue = {
  readonly uri: string;
  /** As written, "" where it is left out. */
  readonly unitId: string;
  readonly symbol: string;
  readonly symbolLocale: string;
  readonly name: string;
  readonly nameLocale: string;
};

const NO_UNITS: readonly UnitValue[] = [];

export const listUnits = makeTreeQuestion(NO_UNITS, (root) =>
  listBodiesBelow(root, "EUInformation").map((body) => ({
    uri: textOf(body, "NamespaceUri"),
    unitId: textOf(body, "UnitId"),
    symbol: textOf(body, "DisplayName", "Text"),
    symbolLocale: textOf(body, "DisplayName", "Locale"),
    name: textOf(body, "Description", "Text"),
    nameLocale: textOf(body, "Description", "Locale"),
  })),
);

/** Whether a URI differs from a known one only by scheme, www, letter case, closing slash or blanks. */
export function isNearMiss(uri: string, known: string): boolean {
  return uri !== known && toSkeleton(uri) === toSkeleton(known);
}

function toSkeleton(uri: string): string {
  return uri
    .toLowerCase()
    .replace(/\s/g, "")
    .replace(/^https?:\/\//, "")
    .replace(/^www\./, "")
    .replace(/\/+$/, "");
}

/**
 * The UN/CEFACT common code behind a unitId: its bytes are the characters, high byte first. Undefined when they are not
 * two or three characters of 0–9 and A–Z.
 */
export function decodeUnitId(unitId: number): string | undefined {
  if (!Number.isInteger(unitId) || unitId <= 0 || unitId > 0xffffff) return undefined;
  const bytes = [(unitId >> 16) & 0xff, (unitId >> 8) & 0xff, unitId & 0xff];
  const code = String.fromCharCode(...bytes.filter((b, i) => b !== 0 || i > 0));
  return /^[0-9A-Z]{2,3}$/.test(code) ? code : undefined;
}

export function isUnece({ uri }: UnitValue): boolean {
  return uri === UNECE_URI;
}
