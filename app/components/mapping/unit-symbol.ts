import { unitByCode } from "~/domain/units/units";

/** The symbol of a UN/CEFACT code; the code itself where the table has none. */
export function findUnitSymbol(code: string): string {
  return unitByCode(code)?.symbol ?? code;
}
