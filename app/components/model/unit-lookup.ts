/** The unit table for screens. It is large, so it comes when somebody begins to look for a unit; until then it answers nothing. */
import { useEffect, useSyncExternalStore } from "react";
import type * as units from "~/domain/units/units";
import { toUnitFacts, type UnitFacts } from "./analog-facts";

type UnitModule = Pick<typeof units, "findUnits" | "listUnits" | "toEuInformation" | "toUnitCode" | "convert"> & { readonly synonyms: ReadonlyMap<string, string> };

/** A unit of the table, with what else a list shows of it. */
export type UnitHit = UnitFacts & { readonly code: string; readonly quantity: string };

export const UNIT_TABLE = "UNECE Recommendation 20";

let table: UnitModule | undefined;
let loading: Promise<void> | undefined;
const listeners = new Set<() => void>();

export function loadUnits(): Promise<void> {
  loading ??= Promise.all([import("~/domain/units/units"), import("~/domain/units/common-units")]).then(([loaded, common]) => {
    table = { ...loaded, synonyms: common.UNIT_SYNONYMS };
    for (const listener of [...listeners]) listener();
  });
  return loading;
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

export function hasUnits(): boolean {
  return table !== undefined;
}

/** Whether the table is there; brings it once it is wanted, and draws again when it came. */
export function useUnitTable(isWanted = true): boolean {
  useEffect(() => {
    if (isWanted) void loadUnits();
  }, [isWanted]);
  return useSyncExternalStore(subscribe, () => table !== undefined, () => false);
}

export function countUnits(): number {
  return table?.listUnits().length ?? 0;
}

/** Best answers first; an empty query answers the units that plants use most. */
export function searchUnits(query: string, limit: number): readonly UnitHit[] {
  return table?.findUnits(query, limit).map((unit) => ({ ...toUnitFacts((table as UnitModule).toEuInformation(unit)), code: unit.code, quantity: unit.quantity ?? "" })) ?? [];
}

/** The unit that somebody means by exactly this text: symbol, name, code or a usual spelling. */
export function findSpokenUnit(text: string): UnitFacts | undefined {
  const [hit] = searchUnits(text, 1);
  if (!hit || !table) return undefined;
  const spoken = text.trim();
  const folded = spoken.toLowerCase().replace(/[\s.]+/g, "");
  const isExact = hit.symbol === spoken || hit.code === spoken || hit.name.toLowerCase() === spoken.toLowerCase() || table.synonyms.get(folded) === hit.code;
  return isExact ? hit : undefined;
}

/** The value in another unit of the same quantity; undefined where the units do not fit, or the table has not come. */
export function convertUnit(value: number, from: UnitFacts, to: UnitFacts): number | undefined {
  const [a, b] = [table?.toUnitCode(from.unitId), table?.toUnitCode(to.unitId)];
  const converted = a !== undefined && b !== undefined ? table?.convert(value, a, b) : undefined;
  return converted?.ok ? converted.value : undefined;
}
